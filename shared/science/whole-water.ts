import { wholeShare } from './region-outline'

/** A region with fewer whole water cells of a grid shows the single cells: no percentiles, nothing raised by itself. */
export const fewestWholeCells = 5

/** How many cells lie wholly inside and are water; where the mask has no water at all it is no mask, and all count. */
export function wholeWaterCells({ share, water }: { share: Float64Array; water: Uint8Array }): number {
  const isMask = water.some((cell) => cell === 1)
  return share.reduce((count, part, i) => count + Number(part >= wholeShare && (!isMask || water[i] === 1)), 0)
}
