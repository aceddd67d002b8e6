import type { KeyboardEvent, PointerEvent } from 'react'
import type { FeedDays } from '../../../shared/schemas/layers'
import { useWide } from '../../hooks/use-wide'
import { addDays, dayWithYear, daysBetween, shortDay } from '../../lib/dates'
import { dayByKey, daysAround, within } from './slider-days'
import { dayWords } from './day-words'

interface Props {
  day: string
  /** Of the whole feed. */
  first: string
  last: string
  layersOf: ReadonlyMap<string, FeedDays['days'][number]['layers']>
  onChange: (day: string) => void
}

/** One segment a day, a bar where the feed has a layer, hatch where it has none. */
export function DaySlider({ day, first, last, layersOf, onChange }: Props) {
  const wide = useWide()
  const shown = daysAround(day, wide ? 2 : 1)
  const step = (event: KeyboardEvent) => {
    const to = dayByKey(event.key, event.shiftKey, day, first, last)
    if (to === undefined) return
    event.preventDefault()
    if (to !== day) onChange(to)
  }
  const dragTo = (event: PointerEvent<HTMLElement>) => {
    const box = event.currentTarget.getBoundingClientRect()
    const index = Math.floor(((event.clientX - box.left) / box.width) * shown.length)
    const to = within(shown[Math.min(shown.length - 1, Math.max(0, index))] ?? day, first, last)
    if (to !== day) onChange(to)
  }
  return (
    <div
      role="slider"
      tabIndex={0}
      aria-label="Day on the map"
      aria-valuemin={0}
      aria-valuemax={daysBetween(first, last)}
      aria-valuenow={daysBetween(first, day)}
      aria-valuetext={`${dayWithYear(day)}, ${dayWords(layersOf.get(day))}`}
      onKeyDown={step}
      onPointerDown={(event) => {
        event.currentTarget.setPointerCapture?.(event.pointerId)
        dragTo(event)
      }}
      onPointerMove={(event) => {
        if (event.buttons & 1) dragTo(event)
      }}
      className="relative grid h-13 cursor-pointer touch-pan-y select-none"
      style={{ gridTemplateColumns: `repeat(${shown.length}, minmax(0, 1fr))` }}
    >
      {shown.map((one, i) => (
        <DayColumn
          key={one}
          day={one}
          beyond={one < first || one > last}
          layers={layersOf.get(one)}
          inked={i % 2 === 0}
          edge={i === 0}
          chosen={one === day}
          label={labelOf(one, wide)}
        />
      ))}
    </div>
  )
}

/** The month at its first day, then every fifth day; on a phone there is room for no more. */
function labelOf(day: string, wide: boolean): string {
  const date = Number(day.slice(8))
  if (date === 1) return wide ? shortDay(day) : shortDay(day).slice(2)
  return date % 5 === 0 && addDays(day, 1).slice(5, 7) === day.slice(5, 7) ? String(date) : ''
}

interface ColumnProps {
  day: string
  beyond: boolean
  layers: FeedDays['days'][number]['layers'] | undefined
  inked: boolean
  edge: boolean
  chosen: boolean
  label: string
}

function DayColumn({ day, beyond, layers, inked, edge, chosen, label }: ColumnProps) {
  const trusted = layers?.some((layer) => !layer.suspect)
  const bar = chosen ? (layers ? 'border-accent bg-accent' : 'border-accent hatch-fine') : trusted ? 'border-ink3 bg-ink3' : layers ? 'border-ink2 bg-paper' : 'border-transparent hatch-fine'
  return (
    <div aria-hidden title={`${dayWithYear(day)}: ${beyond ? 'outside the record' : dayWords(layers)}`} className="grid grid-rows-[1.5rem_6px_1fr]">
      <div className="flex items-end justify-center">
        {!beyond && <span className={`mx-[8%] block w-full border ${bar} ${chosen ? 'h-6' : layers ? 'h-4.5' : 'h-2'}`} />}
      </div>
      <div className={`border-y border-r border-(--segment) ${edge ? 'border-l' : ''} ${beyond ? 'opacity-30' : ''} ${inked ? 'bg-(--segment)' : 'bg-paper'}`} />
      <div className="fig relative text-fine text-ink2">
        <span className={`absolute top-0.5 whitespace-nowrap ${edge ? 'left-0' : 'left-1/2 -translate-x-1/2'}`}>{label}</span>
      </div>
    </div>
  )
}
