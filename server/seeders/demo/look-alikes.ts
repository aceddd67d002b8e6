import { bell } from './bell'
import { addPatch } from './blooms'
import { epochDay, yearOf } from './days'
import type { DemoGrid } from './grid'
import { uniformAt } from './noise'
import { streams } from './streams'

/** After heavy rain the river throws silt into Corran Mouth: standard chlorophyll reads too high, no bloom. */
interface Pulse {
  peak: number
  /** Log10 by which chlorophyll reads too high at the mouth. */
  strength: number
  fallDays: number
}

/** Rain comes between these days of the year (0 is 1 January), one pulse in each window, some years none. */
const wetWindows: [number, number][] = [[12, 62], [76, 112], [226, 280], [288, 345]]

function pulsesOf(year: number, seed: number): Pulse[] {
  const newYear = epochDay(`${year}-01-01`)
  return wetWindows.flatMap(([from, to], window) => {
    const draw = (what: number) => uniformAt(streams.pulses, seed, year * 100 + window * 10 + what)
    if (draw(0) < 0.12) return []
    const peak = newYear + Math.floor(from + draw(1) * (to - from))
    return [{ peak, strength: 0.5 + 0.22 * draw(2), fallDays: 3 + 3 * draw(3) }]
  })
}

/** How strong the river's plume is on a day, in log10 of chlorophyll misread at the mouth; 0 most days. */
export function plumeStrength(seed: number, day: number): number {
  const year = yearOf(day)
  const pulses = [...pulsesOf(year - 1, seed), ...pulsesOf(year, seed)]
  return Math.max(0, ...pulses.map(({ peak, strength, fallDays }) => strength * bell(day, peak, 1, fallDays)))
}

/** The plume's shape: fans out westward from the river's mouth. */
export function addPlume(target: Float64Array, grid: DemoGrid, strength: number) {
  if (strength < 0.02) return
  addPatch(target, grid, strength, [-9.92, 52.6], [36, 21])
}

/** Summers in which chalky plankton (coccolithophores) turned Fennick Ground milky: day of the greatest, in each. */
const chalkySummers = ['2019-06-21', '2022-07-04', '2025-06-28'].map(epochDay)

/** How chalky the water is at the middle of Fennick Ground, 0 to 1; 0 most days. */
export function chalkStrength(day: number): number {
  return Math.max(0, ...chalkySummers.map((peak) => bell(day, peak, 8, 11)))
}

/** Chalk per cell, 0 to 1. */
export function addChalk(target: Float64Array, grid: DemoGrid, strength: number) {
  if (strength < 0.02) return
  addPatch(target, grid, strength, [-7.82, 50.95], [31, 20])
}

/** Above this much chalk the standard mask takes the water for cloud and drops chlorophyll. */
export const chalkMasked = 0.45

/** Log10 by which chlorophyll reads too high per unit of chalk, where it is not masked. */
export const chalkMisread = 0.36
