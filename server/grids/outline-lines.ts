import type { Grid } from '../../shared/science/grid'
import type { GridCorner } from '../../shared/science/patch-outlines'
import { unprojectFrom } from './read/project'

/**
 * Lines along cell edges as longitude and latitude, unwrapped: no step jumps round the globe. Each line begins within
 * half a turn of `near`. Corners without a place are left out; `round` is how many columns make a full circle.
 */
export function outlineLines(grid: Grid, rings: readonly GridCorner[][], round: number | null, near: number): [longitude: number, latitude: number][][] {
  const placeOf = cornerPlaces(grid, round)
  return rings.flatMap((ring) => {
    const places = ring.map(placeOf).filter(([lon, lat]) => Number.isFinite(lon + lat))
    const [first] = places
    if (!first) return []
    const shift = 360 * Math.round((near - first[0]) / 360)
    let before = first[0]
    return [
      places.map(([lon, lat]): [number, number] => {
        // Columns of axes are counted on over the seam; elsewhere each corner is the shorter way from the last.
        before = grid.kind === 'axes' ? lon : lon - 360 * Math.round((lon - before) / 360)
        return [rounded(before + shift), rounded(lat)]
      }),
    ]
  })
}

function cornerPlaces(grid: Grid, round: number | null): (corner: GridCorner) => [number, number] {
  const turnOf = (column: number) => (round === null ? 0 : Math.floor(column / round))
  if (grid.kind === 'axes') {
    const way = grid.lonEdges[grid.columns]! > grid.lonEdges[0]! ? 360 : -360
    return ([row, column]) => [grid.lonEdges[column - turnOf(column) * (round ?? 0)]! + way * turnOf(column), grid.latEdges[row]!]
  }
  if (grid.kind === 'curvilinear') {
    return ([row, column]) => {
      const at = row * (grid.columns + 1) + column - turnOf(column) * (round ?? 0)
      return [grid.cornerLons[at]!, grid.cornerLats[at]!]
    }
  }
  const [t0, t1, t2, t3, t4, t5] = grid.transform
  const unproject = unprojectFrom(grid.crs)
  return ([row, column]) => unproject(t0 + t1 * column + t2 * row, t3 + t4 * column + t5 * row)
}

/** A tenth of a metre. */
const rounded = (degrees: number): number => Math.round(degrees * 1e6) / 1e6
