import type { KeyboardEvent } from 'react'
import type { Today } from '../../../shared/schemas/today'
import { Mark, severityMark } from '../../components/ui/mark'
import { useWide } from '../../hooks/use-wide'
import { longDay, shortDay } from '../../lib/dates'
import { percent } from '../../lib/format'

type Day = Today['days'][number]

interface Props {
  days: readonly Day[]
  day: Day
  floor: number
  onChange: (day: string) => void
}

const barPx = 26
const stepsOf: Record<string, number> = { ArrowLeft: -1, ArrowDown: -1, ArrowRight: 1, ArrowUp: 1, PageUp: -7, PageDown: 7 }

/** One segment a day: how much of the watched water was seen, which alerts were raised; and the slider of the map. */
export function DayRule({ days, day, floor, onChange }: Props) {
  const wide = useWide()
  const shown = wide ? days : days.slice(-10)
  const index = shown.findIndex((d) => d.day === day.day)
  const move = (event: KeyboardEvent) => {
    const step = stepsOf[event.key]
    const next = event.key === 'Home' ? 0 : event.key === 'End' ? shown.length - 1 : step === undefined ? undefined : index + step
    if (next === undefined) return
    event.preventDefault()
    const to = shown[Math.min(shown.length - 1, Math.max(0, next))]
    if (to) onChange(to.day)
  }
  return (
    <section aria-label="Days" className="grid items-end gap-x-6 gap-y-2 tab:grid-cols-[10.5rem_minmax(0,1fr)]">
      <div className="tab:pb-4">
        <h2 className="text-lead">{longDay(day.day)}</h2>
        <p className="text-small text-ink2">{seenWords(day)}</p>
      </div>
      <div
        role="slider"
        tabIndex={0}
        aria-label="Day shown on the map"
        aria-valuemin={0}
        aria-valuemax={shown.length - 1}
        aria-valuenow={Math.max(0, index)}
        aria-valuetext={`${longDay(day.day)}, ${seenWords(day)}`}
        onKeyDown={move}
        className="relative grid"
        style={{ gridTemplateColumns: `repeat(${shown.length}, minmax(0, 1fr))` }}
      >
        <div
          aria-hidden
          className="pointer-events-none absolute inset-x-0 border-t border-dotted border-ink2"
          style={{ top: 24 + barPx * (1 - floor) }}
        />
        {shown.map((d, i) => (
          <DayColumn key={d.day} day={d} inked={i % 2 === 0} floor={floor} first={i === 0} chosen={d.day === day.day} onChoose={() => onChange(d.day)} />
        ))}
      </div>
    </section>
  )
}

function seenWords(day: Day): string {
  if (day.seen !== null) return `${percent(day.seen)} of your water seen`
  return day.due ? 'layer expected' : 'no layer'
}

interface ColumnProps {
  day: Day
  inked: boolean
  floor: number
  first: boolean
  chosen: boolean
  onChoose: () => void
}

function DayColumn({ day, inked, floor, first, chosen, onChoose }: ColumnProps) {
  const worst = day.alerts.at(-1)
  return (
    <div aria-hidden className="cursor-pointer" onPointerDown={onChoose} title={`${longDay(day.day)}: ${seenWords(day)}`}>
      <div className="grid h-6 place-items-center text-ember">{worst && <Mark name={severityMark(worst.severity)} size={16} />}</div>
      <div className="relative" style={{ height: barPx }}>
        <Bar day={day} floor={floor} chosen={chosen} />
      </div>
      <div className={`h-1.5 border-y border-r border-(--segment) ${first ? 'border-l' : ''} ${inked ? 'bg-(--segment)' : 'bg-paper'}`} />
      <div
        className={`${chosen || first || weekday(day.day) === 1 ? '' : 'tab:max-desk:invisible'} fig mt-px flex h-5 items-center text-small whitespace-nowrap ${first && !chosen ? 'justify-end' : 'justify-center'} ${chosen ? 'bg-accent font-heading text-onAccent' : weekday(day.day) === 1 ? 'font-heading' : 'text-ink2'}`}
      >
        {!chosen && (first || day.day.endsWith('-01')) ? <b className="font-heading text-ink">{shortDay(day.day)}</b> : Number(day.day.slice(8))}
      </div>
    </div>
  )
}

/** Nothing seen is three strokes; below the floor, an outlined bar: a view that judges nothing. */
function Bar({ day, floor, chosen }: { day: Day; floor: number; chosen: boolean }) {
  if (day.seen === null) {
    return (
      <span className="absolute inset-x-0 bottom-0 grid h-4 place-items-center text-ink2">
        {day.due ? <span className="fig text-small">due</span> : <Mark name="state-not-seen" size={15} />}
      </span>
    )
  }
  const height = Math.max(1, Math.round(day.seen * barPx))
  const fill = day.seen < floor ? 'border border-b-0 border-ink2 bg-paper' : chosen ? 'bg-ink' : 'bg-ink3'
  return <span className={`absolute bottom-0 left-[6%] w-[88%] ${fill}`} style={{ height }} />
}

function weekday(day: string): number {
  return new Date(`${day}T00:00Z`).getUTCDay()
}
