import { addBlooms } from './blooms'
import type { DemoGrid } from './grid'
import { addChalk, addPlume, chalkMisread, chalkStrength, plumeStrength } from './look-alikes'
import { addNoise } from './noise'
import { streams } from './streams'
import { springShiftDays, usualLog10 } from './usual'

/** The sea on one date, seen through no cloud. */
export interface Sea {
  /** log10 of the chlorophyll a standard method would read (mg m-3); NaN on land. */
  chlorophyllLog10: Float64Array
  /** Log10 by which the river's silt makes chlorophyll read too high. */
  plume: Float64Array
  /** 0 to 1. */
  chalk: Float64Array
}

/** Scatter of the sea about its usual, in log10; with a sensor's own it comes to about 0.15 a cell. */
const scatter = { slow: 0.04, wide: 0.06, eddies: 0.075, patches: 0.085 }

export function seaOn(grid: DemoGrid, seed: number, day: number): Sea {
  const chlorophyllLog10 = usualLog10(grid, seed, day, springShiftDays(seed, day))
  addNoise(chlorophyllLog10, scatter.slow, streams.slow, seed, day, grid)
  addNoise(chlorophyllLog10, scatter.wide, streams.wide, seed, day, grid)
  addNoise(chlorophyllLog10, scatter.eddies, streams.eddies, seed, day, grid)
  addNoise(chlorophyllLog10, scatter.patches, streams.patches, seed, day, grid)
  const blooming = new Float64Array(chlorophyllLog10.length)
  addBlooms(blooming, grid, day)
  const plume = new Float64Array(chlorophyllLog10.length)
  const chalk = new Float64Array(chlorophyllLog10.length)
  addPlume(plume, grid, plumeStrength(seed, day))
  addChalk(chalk, grid, chalkStrength(day))
  const threads = new Float64Array(chlorophyllLog10.length)
  addNoise(threads, 1, streams.threads, seed, day, grid)
  for (let i = 0; i < plume.length; i++) {
    const thread = threads[i] ?? 0
    chalk[i] = Math.min(1, (chalk[i] ?? 0) * Math.exp(0.45 * thread))
    const added = (blooming[i] ?? 0) * (1 + 0.16 * thread) + (plume[i] ?? 0) + chalkMisread * (chalk[i] ?? 0)
    chlorophyllLog10[i] = (chlorophyllLog10[i] ?? Number.NaN) + added
  }
  return { chlorophyllLog10, plume, chalk }
}
