import { Button } from '../../components/ui/button'
import { longDay } from '../../lib/dates'
import { dayWords } from './day-words'
import type { Days } from './use-days'

interface Props {
  day: string
  days: Days
  onChange: (day: string) => void
}

/** The day in words between steps to the layer before and after it. */
export function DayHead({ day, days: { before, after, layersOf }, onChange }: Props) {
  return (
    <div className="flex items-center justify-between gap-x-3">
      <Button size="small" className="min-w-11" aria-label="Layer before" disabled={before === undefined} onClick={() => before && onChange(before)}>
        ‹<span className="hidden tab:inline">layer before</span>
      </Button>
      <div className="min-w-0 text-center">
        <h2 className="truncate text-body font-heading tab:text-lead">
          {longDay(day)} {day.slice(0, 4)}
        </h2>
        <p className="truncate text-small text-ink2">{dayWords(layersOf.get(day))}</p>
      </div>
      <Button size="small" className="min-w-11" aria-label="Layer after" disabled={after === undefined} onClick={() => after && onChange(after)}>
        <span className="hidden tab:inline">layer after</span>›
      </Button>
    </div>
  )
}
