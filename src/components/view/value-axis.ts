import { ticksOf, type Tick } from '../../../shared/colouring'
import type { RegionView } from '../../../shared/schemas/patches'

type Bin = NonNullable<RegionView['view']>['histogram'][number]

export interface ValueAxis {
  from: number
  to: number
  ticks: Tick[]
  /** Where a value stands, 0..1, kept between the ends. */
  place: (value: number) => number
  /** Bins with both ends, and what lies beyond the axis. */
  bins: { from: number; to: number; areaKm2: number }[]
  belowKm2: number
  aboveKm2: number
}

/** A log axis with room for every bin and for the level; null where no bin has both ends. */
export function valueAxis(histogram: readonly Bin[], level: number): ValueAxis | null {
  const bins = histogram.flatMap(({ from, to, areaKm2 }) => (from === null || to === null ? [] : [{ from, to, areaKm2 }]))
  const [first, last] = [bins[0], bins.at(-1)]
  if (!first || !last) return null
  const withLevel = level > 0.001 && level < 1000 ? [level / 1.25, level * 1.25] : []
  const [from, to] = [Math.min(first.from, ...withLevel), Math.max(last.to, ...withLevel)]
  const beyond = (is: (bin: Bin) => boolean) => histogram.filter(is).reduce((sum, bin) => sum + bin.areaKm2, 0)
  return {
    from,
    to,
    ticks: ticksOf({ ramp: 'sea', scale: 'log', from, to, rangeFrom: 'layer' }),
    place: (value) => Math.min(Math.max(Math.log(Math.max(value, 1e-9) / from) / Math.log(to / from), 0), 1),
    bins,
    belowKm2: beyond((bin) => bin.from === null),
    aboveKm2: beyond((bin) => bin.to === null),
  }
}
