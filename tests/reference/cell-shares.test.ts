import type { MultiPolygon, Polygon } from 'geojson'
import { describe, expect, it } from 'vitest'
import { cellShares } from '../../shared/science/cell-shares'
import type { Grid } from '../../shared/science/grid'
import reference from './values/cell-shares.json'

type Stored = { lat: number[]; lon: number[] } | { transform: number[]; rows: number; columns: number }

function gridOf(stored: Stored): Grid {
  if ('transform' in stored) {
    const [t0 = NaN, t1 = NaN, t2 = NaN, t3 = NaN, t4 = NaN, t5 = NaN] = stored.transform
    const { rows, columns } = stored
    return { kind: 'transform', rows, columns, transform: [t0, t1, t2, t3, t4, t5], crs: '+proj=longlat' }
  }
  const [latEdges, lonEdges] = [Float64Array.from(stored.lat), Float64Array.from(stored.lon)]
  return { kind: 'axes', rows: latEdges.length - 1, columns: lonEdges.length - 1, latEdges, lonEdges }
}

const grids: Record<string, Stored> = reference.grids
const polygons = reference.polygons as unknown as Record<string, Polygon | MultiPolygon>

describe('shares of cells agree with intersections by shapely', () => {
  it.each(reference.cases.map((item) => [item.polygon, item.grid, item] as const))('%s, %s', (polygon, grid, item) => {
    const found = cellShares(polygons[polygon]!, gridOf(grids[grid]!), (lon, lat) => [lon, lat])
    expect([...found.index]).toEqual(item.index)
    const worst = Math.max(...item.share.map((share, i) => Math.abs(share - found.share[i]!)))
    expect(worst).toBeLessThan(1e-12)
  })
})
