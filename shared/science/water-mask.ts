/** A cell is water where it was seen in at least this share of the layers of a period. */
export const usualMinShare = 0.05

/**
 * Whether a cell seen in `seen` of `layers` layers is water: seen / layers at or above the share (0..1). The quotient is
 * compared, not the product: 7 of 140 is 5 %, though 0.05 x 140 is a little more than 7. No layers at all: false.
 */
export function isOftenSeen(seen: number, layers: number, minShare: number): boolean {
  return layers > 0 && seen / layers >= minShare
}

/** Room for a bit a cell, all 0. */
export function emptyBits(cells: number): Uint8Array {
  return new Uint8Array(Math.ceil(cells / 8))
}

/** 1 or 0: cell 0 is the lowest bit of the first byte. */
export function bitAt(bits: Uint8Array, cell: number): 0 | 1 {
  return ((bits[cell >> 3]! >> (cell & 7)) & 1) as 0 | 1
}

export function setBit(bits: Uint8Array, cell: number): void {
  bits[cell >> 3]! |= 1 << (cell & 7)
}
