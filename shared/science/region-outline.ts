/** A share this close to 1 is a whole cell. */
export const wholeShare = 1 - 1e-9

/** The cells of one region on one grid, all lists of one length. */
export interface RegionShares {
  /** Share of the cell inside the region, 0..1. */
  share: Float64Array
  /** Area of the full cell in km2. */
  areaKm2: Float64Array
  /** 1 where the mask says water; without a mask every cell is water. */
  water?: Uint8Array
  /** Water of the region that lies outside the grid in km2: never seen, and part of its water all the same. */
  outsideWaterKm2?: number
}

/** What is the same for every view of a region: worked out once, used for a decade of layers. */
export interface RegionOutline {
  /** Share times area; 0 for a cell that is not part. */
  weightKm2: Float64Array
  /** Per cell: 1 a part of the region, 2 wholly inside it, 4 water of the mask, added up. */
  kind: Uint8Array
  cells: number
  wholeCells: number
  /** On the grid and outside it. */
  waterAreaKm2: number
}

export const isPart = 1
export const isWhole = 2
export const isWater = 4

/** Lists of different lengths are a RangeError. */
export function regionOutline({ share, areaKm2, water, outsideWaterKm2 = 0 }: RegionShares): RegionOutline {
  if (areaKm2.length !== share.length || (water && water.length !== share.length)) {
    throw new RangeError('Shares, areas and mask of a region have one length.')
  }
  const outline: RegionOutline = { weightKm2: new Float64Array(share.length), kind: new Uint8Array(share.length), cells: 0, wholeCells: 0, waterAreaKm2: outsideWaterKm2 }
  for (let i = 0; i < share.length; i++) {
    if (!(share[i]! > 0)) continue
    const whole = share[i]! >= wholeShare
    const wet = !water || water[i] === 1
    outline.weightKm2[i] = share[i]! * areaKm2[i]!
    outline.kind[i] = isPart | (whole ? isWhole : 0) | (wet ? isWater : 0)
    outline.cells++
    if (whole) outline.wholeCells++
    if (wet) outline.waterAreaKm2 += outline.weightKm2[i]!
  }
  return outline
}

/** A mask without any water here is no mask for this region: every cell counts. */
export function waterOf({ water }: { water: Uint8Array }): Uint8Array | undefined {
  return water.includes(1) ? water : undefined
}

/** The outline as figures and patches take it, with that rule for its mask. */
export function outlineOf({ share, areaKm2, water: mask, outsideWaterKm2 }: Required<RegionShares>): RegionOutline {
  const water = waterOf({ water: mask })
  return regionOutline({ share, areaKm2, outsideWaterKm2, ...(water ? { water } : {}) })
}
