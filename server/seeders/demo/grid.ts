import { landMask } from '../../geography/land'

/** Cell centres in degrees, north to south and west to east, and which cells are land. Values are row-major. */
export interface DemoGrid {
  latitudes: Float64Array
  longitudes: Float64Array
  /** Position of each centre in the scenario's box, 0 in the north and west, 1 in the south and east. */
  southward: Float64Array
  eastward: Float64Array
}

/** Steps and edges are short binary fractions, so that every file format gives the very same cells. */
const step = { latitude: 9 / 256, longitude: 7 / 128 }

export const box = { west: -12.375, east: -12.375 + 100 * step.longitude, south: 53.5 - 80 * step.latitude, north: 53.5 }

/** About 4 km: 80 rows by 100 columns. */
export const demoGrid = regularGrid(80, 100)

/** About 8 km, for the second sensor and the reprocessed feed: 40 rows by 50 columns. */
export const coarseGrid = regularGrid(40, 50)

function regularGrid(rows: number, columns: number): DemoGrid {
  const southward = Float64Array.from({ length: rows }, (_, i) => (i + 0.5) / rows)
  const eastward = Float64Array.from({ length: columns }, (_, i) => (i + 0.5) / columns)
  const [height, width] = [(box.north - box.south) / rows, (box.east - box.west) / columns]
  const latitudes = southward.map((_, row) => box.north - (row + 0.5) * height)
  const longitudes = eastward.map((_, column) => box.west + (column + 0.5) * width)
  return { latitudes, longitudes, southward, eastward }
}

const landOf = new WeakMap<DemoGrid, Uint8Array>()

/** 1 where the cell's centre is on land. */
export function landOn(grid: DemoGrid): Uint8Array {
  const known = landOf.get(grid)
  if (known) return known
  const mask = landMask(grid.latitudes, grid.longitudes)
  landOf.set(grid, mask)
  return mask
}

const kmPerLatitude = 111.3

/** Kilometres east and north of a point, on a plane good to 1 % over the box. */
export function kmFrom(longitude: number, latitude: number, toLongitude: number, toLatitude: number): [number, number] {
  const middle = ((latitude + toLatitude) / 2) * (Math.PI / 180)
  return [(toLongitude - longitude) * kmPerLatitude * Math.cos(middle), (toLatitude - latitude) * kmPerLatitude]
}

/** Calls `visit(index, longitude, latitude)` for every cell, rows first. */
export function eachCell(grid: DemoGrid, visit: (index: number, longitude: number, latitude: number) => void) {
  let index = 0
  for (const latitude of grid.latitudes) for (const longitude of grid.longitudes) visit(index++, longitude, latitude)
}
