import { hidden } from './clouds'
import { msPerDay } from './days'
import { coarseGrid, demoGrid, type DemoGrid } from './grid'
import { chalkMasked } from './look-alikes'
import { addWhiteNoise } from './noise'
import { reflectances } from './reflectance'
import { longFeedVersions, reflectanceBands, scenarioDays, seed } from './scenario'
import type { ChlorophyllFeedKey, ReflectanceBand } from './scenario'
import { seaOn } from './sea'
import { streams } from './streams'

export { coarseGrid, demoGrid } from './grid'

export interface DemoField {
  /** mg m-3, row-major over the feed's grid, NaN where missing. */
  values: Float64Array
  /** Epoch ms UTC. */
  observedAt: number
}

export interface DemoReflectance {
  /** sr-1 per band, row-major over `demoGrid`, NaN where missing. */
  values: Record<ReflectanceBand, Float64Array>
  observedAt: number
}

/** A sensor: its number, its own scatter in log10, the minutes after noon UTC it passes at, and its grid. */
const sensors: Record<ChlorophyllFeedKey, { sensor: number; scatter: number; minutes: number; grid: DemoGrid }> = {
  chl: { sensor: 0, scatter: 0.07, minutes: 40, grid: demoGrid },
  chlSecond: { sensor: 1, scatter: 0.06, minutes: 95, grid: coarseGrid },
  chlLong: { sensor: 2, scatter: 0.06, minutes: 15, grid: coarseGrid },
}

export function gridOf(feed: ChlorophyllFeedKey): DemoGrid {
  return sensors[feed].grid
}

/** Whether a feed has a layer of a day; what comes after the history goes on for ever, save for the silent sensor. */
export function hasLayer(feed: ChlorophyllFeedKey | 'rrs', day: number): boolean {
  if (feed === 'chl') return day >= scenarioDays.first
  if (feed === 'rrs') return day >= scenarioDays.firstOfReflectance
  if (day < scenarioDays.firstOfSecondFeeds) return false
  return feed === 'chlLong' || day <= scenarioDays.lastOfSecond
}

/**
 * Chlorophyll of one feed on one day (days since 1970), or null when the feed has no layer then. Depends on the seed
 * and the day alone: not on when or in which order it is asked for.
 */
export function chlorophyllOn(feed: ChlorophyllFeedKey, day: number): DemoField | null {
  if (!hasLayer(feed, day)) return null
  const { sensor, scatter, grid } = sensors[feed]
  const { chlorophyllLog10, chalk } = seaOn(grid, seed, day)
  addWhiteNoise(chlorophyllLog10, scatter, streams.sensor + sensor, seed, day)
  const unseen = hidden(grid, seed, day, sensor)
  const factor = feed === 'chlLong' && day >= scenarioDays.longFeedChange ? longFeedVersions.factor : 1
  const values = new Float64Array(chlorophyllLog10.length).fill(Number.NaN)
  for (let i = 0; i < values.length; i++) {
    if (!unseen[i] && (chalk[i] ?? 0) <= chalkMasked) values[i] = factor * 10 ** (chlorophyllLog10[i] ?? Number.NaN)
  }
  return { values, observedAt: passOn(feed, day) }
}

/** The first sensor's reflectances on one day; the chalky middle that chlorophyll lacks is there. */
export function reflectanceOn(day: number): DemoReflectance | null {
  if (!hasLayer('rrs', day)) return null
  const { sensor, scatter, grid } = sensors.chl
  const { chlorophyllLog10, plume, chalk } = seaOn(grid, seed, day)
  addWhiteNoise(chlorophyllLog10, scatter, streams.sensor + sensor, seed, day)
  const unseen = hidden(grid, seed, day, sensor)
  // Glint and haze brighten or dim all bands of a cell alike, so the ratio that gives chlorophyll stays.
  const bright = new Float64Array(chlorophyllLog10.length)
  addWhiteNoise(bright, 0.015, streams.glint, seed, day)
  const empty = () => new Float64Array(chlorophyllLog10.length).fill(Number.NaN)
  const values = { 443: empty(), 490: empty(), 510: empty(), 555: empty(), 670: empty() }
  chlorophyllLog10.forEach((log10, i) => {
    if (unseen[i] || Number.isNaN(log10)) return
    const cell = reflectances(log10, Math.min(1, (plume[i] ?? 0) / 0.7), chalk[i] ?? 0)
    for (const band of reflectanceBands) values[band][i] = cell[band] * 10 ** (bright[i] ?? 0)
  })
  return { values, observedAt: passOn('chl', day) }
}

/** The hour of a pass wanders by half an hour over the orbit's sixteen days. */
function passOn(feed: ChlorophyllFeedKey, day: number): number {
  const wander = Math.round(32 * Math.sin((2 * Math.PI * (day - scenarioDays.today)) / 16))
  return day * msPerDay + (12 * 60 + sensors[feed].minutes + wander) * 60_000
}
