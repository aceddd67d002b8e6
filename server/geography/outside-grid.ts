import type { MultiPolygon, Polygon, Position } from 'geojson'
import { cellAreasKm2 } from '../../shared/science/cell-areas'
import { cellShares } from '../../shared/science/cell-shares'
import type { AxesGrid, Grid } from '../../shared/science/grid'

/** A smaller part of a region is what two ways of measuring an area differ by. */
const leastShare = 0.005
const fieldCells = 20_000

interface Inside {
  /** Of the region on the grid, before any shore buffer. */
  areaKm2: number
  /** Of that, what `isOpen`. */
  waterKm2: number
  /** Whether a place is water that counts, by the land outline. */
  isOpen: (longitude: number, latitude: number) => boolean
}

/**
 * Water of a region outside a grid in km2. The region is measured on a fine grid of its own: what of its area is not on
 * the grid lies outside, and of that so much is water as the whole has more than the part on the grid. Where the outline has no water at all, as in
 * a lake, it is no mask and all of the outside counts. 0 where less than 0.5 % of the region is outside.
 */
export function outsideGrid(geometry: Polygon | MultiPolygon, grid: Grid, inside: Inside): number {
  const parts = geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates
  if (parts.every((part) => liesWithin(boxOf(part), grid))) return 0
  const fields = parts.map((part) => fieldOf(part, Math.min(100, Math.max(4, Math.floor(Math.sqrt(fieldCells / parts.length))))))
  const areaKm2 = fields.reduce((sum, field) => sum + field.weightKm2.reduce((a, b) => a + b, 0), 0)
  const outsideKm2 = areaKm2 - inside.areaKm2
  if (!(outsideKm2 > leastShare * areaKm2)) return 0
  let waterKm2 = 0
  for (const { places, weightKm2 } of fields) places.forEach(([longitude, latitude], i) => (waterKm2 += inside.isOpen(longitude, latitude) ? weightKm2[i]! : 0))
  if (waterKm2 === 0) return outsideKm2
  return Math.min(outsideKm2, Math.max(0, waterKm2 - inside.waterKm2))
}

interface Box {
  west: number
  south: number
  east: number
  north: number
}

function boxOf(part: readonly Position[][]): Box {
  const box = { west: Infinity, south: Infinity, east: -Infinity, north: -Infinity }
  for (const [longitude, latitude] of part[0]!) {
    box.west = Math.min(box.west, longitude!)
    box.east = Math.max(box.east, longitude!)
    box.south = Math.min(box.south, latitude!)
    box.north = Math.max(box.north, latitude!)
  }
  return box
}

/** Spares the measuring, and its tolerance, where axes already say it. */
function liesWithin({ west, south, east, north }: Box, grid: Grid): boolean {
  if (grid.kind !== 'axes') return false
  const [low, high] = rangeOf(grid.latEdges)
  const [left, right] = rangeOf(grid.lonEdges)
  const slack = 1e-9
  if (south < low - slack || north > high + slack) return false
  if (right - left >= 360 - 1e-6) return true
  const turns = 360 * Math.ceil((left - slack - west) / 360)
  return east + turns <= right + slack
}

function rangeOf(edges: Float64Array): [number, number] {
  const [first, last] = [edges[0]!, edges.at(-1)!]
  return [Math.min(first, last), Math.max(first, last)]
}

/** One polygon on even cells over its own box: their middles and how much of each is inside. */
function fieldOf(part: Position[][], across: number): { places: [number, number][]; weightKm2: Float64Array } {
  const { west, south, east, north } = boxOf(part)
  const edges = (from: number, to: number) => Float64Array.from({ length: across + 1 }, (_, i) => (i === across ? to : from + ((to - from) * i) / across))
  const grid: AxesGrid = { kind: 'axes', rows: across, columns: across, latEdges: edges(south, north), lonEdges: edges(west, east) }
  const { index, share } = cellShares({ type: 'Polygon', coordinates: part }, grid)
  const areas = cellAreasKm2(grid, index)
  const middle = (all: Float64Array, at: number) => (all[at]! + all[at + 1]!) / 2
  return {
    places: Array.from(index, (cell): [number, number] => [middle(grid.lonEdges, cell % across), middle(grid.latEdges, Math.floor(cell / across))]),
    weightKm2: share.map((part, i) => part * areas[i]!),
  }
}
