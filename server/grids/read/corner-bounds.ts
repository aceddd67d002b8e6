import { near, type Corners } from './corner-places'

/** Where the four corners stand, seen from the cell: row and column of the corner less those of the cell. */
const round = [[0, 0], [0, 1], [1, 1], [1, 0]] as const
const slackShare = 1e-3

/**
 * Corners that neighbouring cells share, from four vertices a cell. Vertices go round the cell, but files begin at any
 * corner and go either way: the order in which neighbours agree is the right one. Null when they agree in none, so
 * that the cells leave gaps or overlap.
 */
export function cornersFromBounds(lats: Float64Array, lons: Float64Array, rows: number, columns: number): Corners | null {
  for (const direction of [1, -1]) {
    for (let first = 0; first < 4; first++) {
      const order = round.map((_, i) => (((first + direction * i) % 4) + 4) % 4)
      const corners = assemble(lats, lons, rows, columns, order)
      if (corners) return corners
    }
  }
  return null
}

/** `order[i]` is the vertex that stands at corner `round[i]`. */
function assemble(
  lats: Float64Array,
  lons: Float64Array,
  rows: number,
  columns: number,
  order: readonly number[],
): Corners | null {
  const count = (rows + 1) * (columns + 1)
  const corners: Corners = { lats: new Float64Array(count).fill(NaN), lons: new Float64Array(count).fill(NaN) }
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < columns; column++) {
      const cell = 4 * (row * columns + column)
      const size = Math.hypot(lats[cell + 2]! - lats[cell]!, near(lons[cell + 2]!, lons[cell]!) - lons[cell]!)
      for (const [i, [down, right]] of round.entries()) {
        const [lat, lon] = [lats[cell + order[i]!]!, lons[cell + order[i]!]!]
        if (!Number.isFinite(lat + lon)) continue
        const corner = (row + down) * (columns + 1) + column + right
        const knownLat = corners.lats[corner]!
        if (Number.isNaN(knownLat)) {
          corners.lats[corner] = lat
          corners.lons[corner] = lon
          continue
        }
        // At the poles all longitudes are the same place.
        const aside = Math.abs(lat) > 90 - 1e-9 ? 0 : near(lon, corners.lons[corner]!) - corners.lons[corner]!
        if (Math.hypot(lat - knownLat, aside) > slackShare * size) return null
      }
    }
  }
  return corners
}
