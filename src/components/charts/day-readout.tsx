import { dayWords } from './day-words'
import type { SeriesDays } from './series-days'

interface Props {
  id: string
  laid: SeriesDays
  /** Epoch day. */
  day: number
  unit: string | null
}

/** The day under the pointer or the focus; the last day shown when there is neither. */
export function DayReadout({ id, laid, day, unit }: Props) {
  const words = dayWords(laid, day, unit)
  return (
    <p id={id} aria-live="polite" className="flex min-h-9 flex-wrap items-baseline gap-x-3 text-small text-ink2 tab:min-h-5">
      <span className="fig text-ink">{words.day}</span>
      {words.value && <span className="fig font-strong text-ink">{words.value}</span>}
      {words.times && <span>{words.times}</span>}
      {words.usual && <span>{words.usual}</span>}
      <span>{words.rest}</span>
    </p>
  )
}
