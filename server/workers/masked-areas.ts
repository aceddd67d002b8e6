import type { MaskedValues } from './read-masked'
import type { RegionCellWeights, ViewFigures } from './tasks'

/** Water of a region that no layer of the view saw, by what hid it in any of them, in km2; a cell may have several reasons. */
export function maskedAreas(
  layers: readonly Pick<MaskedValues, 'hidden'>[],
  merged: Float64Array,
  { share, areaKm2 }: Pick<RegionCellWeights, 'share' | 'areaKm2'>,
  water?: Uint8Array,
): ViewFigures['masked'] {
  const reasons = new Set(layers.flatMap(({ hidden }) => [...hidden.keys()]))
  return [...reasons].sort().flatMap((reason) => {
    let area = 0
    for (let cell = 0; cell < merged.length; cell++) {
      if (!Number.isNaN(merged[cell]) || (water && !water[cell])) continue
      if (layers.some(({ hidden }) => hidden.get(reason)?.[cell])) area += share[cell]! * areaKm2[cell]!
    }
    return area > 0 ? [{ reason, areaKm2: area }] : []
  })
}
