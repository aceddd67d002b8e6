import type { CurvilinearGrid, Grid, TransformGrid } from '../../shared/science/grid'
import { quadBox, type QuadBox, quadCell } from '../../shared/science/quad-cell'
import { unprojectFrom } from './read/project'

export interface GridDescription {
  kind: Grid['kind']
  rows: number
  columns: number
  /** The box round all cells, in degrees; east may be above 180 where a grid counts so. */
  west: number
  south: number
  east: number
  north: number
  /** Size of a cell in degrees; null where cells differ by more than a thousandth, and for other grids than axes. */
  latStep: number | null
  lonStep: number | null
  /** proj4 definition of a projected grid. */
  crs: string | null
}

export function describeGrid(grid: Grid): GridDescription {
  const { kind, rows, columns } = grid
  if (grid.kind === 'transform') {
    return { kind, rows, columns, ...boxOf(grid), latStep: null, lonStep: null, crs: grid.crs }
  }
  if (grid.kind === 'curvilinear') {
    return { kind, rows, columns, ...curvedBox(grid), latStep: null, lonStep: null, crs: null }
  }
  const { latEdges, lonEdges } = grid
  const [south, north] = ordered(latEdges[0]!, latEdges[rows]!)
  const [west, east] = ordered(lonEdges[0]!, lonEdges[columns]!)
  return {
    kind, rows, columns, west, south, east, north,
    latStep: evenStep(latEdges), lonStep: evenStep(lonEdges), crs: null,
  }
}

const ordered = (a: number, b: number): [number, number] => (a < b ? [a, b] : [b, a])

/** The outermost cells are left out: at the poles they are cut. */
function evenStep(edges: Float64Array): number | null {
  const n = edges.length - 1
  const [from, to] = n > 3 ? [1, n - 1] : [0, n]
  const step = Math.abs(edges[to]! - edges[from]!) / (to - from)
  for (let i = from; i < to; i++) {
    if (Math.abs(Math.abs(edges[i + 1]! - edges[i]!) - step) > step * 1e-3) return null
  }
  return step
}

const sidePoints = 64

/** The box round a projected raster, from points along its sides and across its middle. */
function boxOf(grid: TransformGrid) {
  const { rows, columns, transform: t } = grid
  const unproject = unprojectFrom(grid.crs)
  const places: [number, number][] = []
  for (let i = 0; i <= sidePoints; i++) {
    const [c, r] = [(columns * i) / sidePoints, (rows * i) / sidePoints]
    for (const [column, row] of [[c, 0], [c, rows], [0, r], [columns, r], [c, rows / 2], [columns / 2, r]] as const) {
      const place = unproject(t[0] + t[1] * column + t[2] * row, t[3] + t[4] * column + t[5] * row)
      if (!Number.isNaN(place[0])) places.push(place)
    }
  }
  const latitudes = places.map(([, latitude]) => latitude)
  // Across the antimeridian longitudes jump: measured from the middle they don't.
  const [middle] = unproject(
    t[0] + (t[1] * columns) / 2 + (t[2] * rows) / 2,
    t[3] + (t[4] * columns) / 2 + (t[5] * rows) / 2,
  )
  const origin = Number.isNaN(middle) ? 0 : middle
  const longitudes = places.map(([longitude]) => longitude - 360 * Math.round((longitude - origin) / 360))
  return {
    west: Math.min(...longitudes),
    south: Math.min(...latitudes),
    east: Math.max(...longitudes),
    north: Math.max(...latitudes),
  }
}

/** Tenths of a degree. */
const lonBins = 3600

/** The box round cells placed one by one: in longitude all but the widest gap that no cell reaches into. */
function curvedBox(grid: CurvilinearGrid): QuadBox {
  const covered = new Uint8Array(lonBins)
  let [south, north] = [Infinity, -Infinity]
  for (const box of boxesOf(grid)) {
    south = Math.min(south, box.south)
    north = Math.max(north, box.north)
    const last = Math.floor(box.east * 10)
    for (let bin = Math.floor(box.west * 10); bin <= last; bin++) covered[((bin % lonBins) + lonBins) % lonBins] = 1
  }
  const gap = widestGap(covered)
  if (gap === null) return { west: -180, east: 180, south, north }
  // Counted from the middle of the gap, no cell is torn apart.
  const origin = (gap.from + gap.length / 2) / 10
  let [west, east] = [Infinity, -Infinity]
  for (const box of boxesOf(grid)) {
    const turn = 360 * Math.floor((box.west - origin) / 360)
    west = Math.min(west, box.west - turn)
    east = Math.max(east, box.east - turn)
  }
  const turn = 360 * Math.floor((west + 180) / 360)
  return { west: west - turn, east: east - turn, south, north }
}

function* boxesOf(grid: CurvilinearGrid): Generator<QuadBox> {
  for (let cell = 0; cell < grid.rows * grid.columns; cell++) {
    const quad = quadCell(grid, cell)
    if (quad) yield quadBox(quad)
  }
}

/** The longest run of bins that nothing covers, going round the globe; null when everything is covered. */
function widestGap(covered: Uint8Array): { from: number; length: number } | null {
  let best: { from: number; length: number } | null = null
  for (let from = 0; from < lonBins; from++) {
    if (covered[from] || !covered[(from + lonBins - 1) % lonBins]) continue
    let length = 0
    while (length < lonBins && !covered[(from + length) % lonBins]) length++
    if (!best || length > best.length) best = { from, length }
  }
  return best
}
