import type { RegionView } from '../../../shared/schemas/patches'
import { Button } from '../../components/ui/button'
import { longDay } from '../../lib/dates'
import { percent } from '../../lib/format'

interface Props {
  shown: RegionView
  /** The day asked for, which may have no view. */
  day: string
  onChange: (day: string) => void
}

/** From view to view; the newest is one step away. */
export function ViewSteps({ shown: { view, previous, next, last }, day, onChange }: Props) {
  const coverage = view?.coverage ?? null
  return (
    <div className="flex min-w-0 flex-wrap items-center gap-x-3 gap-y-2">
      <Button size="small" className="min-w-11" aria-label="View before" disabled={previous === null} onClick={() => previous && onChange(previous)}>
        ‹<span className="hidden tab:inline">view before</span>
      </Button>
      <p className="min-w-0" aria-live="polite">
        <b className="font-heading">
          {longDay(day)} {day.slice(0, 4)}
        </b>
        <span className="block text-small text-ink2">{view ? (coverage === null ? 'no water' : `${percent(coverage)} of the water seen`) : 'no view on this day'}</span>
      </p>
      <Button size="small" className="min-w-11" aria-label="View after" disabled={next === null} onClick={() => next && onChange(next)}>
        <span className="hidden tab:inline">view after</span>›
      </Button>
      {last !== null && next !== null && next !== last && (
        <Button kind="text" size="small" onClick={() => onChange(last)}>
          Newest
        </Button>
      )}
    </div>
  )
}
