import type { MultiPolygon, Polygon } from 'geojson'
import { describe, expect, it } from 'vitest'
import { cellAreasKm2 } from '../../shared/science/cell-areas'
import { cellShares } from '../../shared/science/cell-shares'
import { summarise } from '../../shared/science/figures'
import type { AxesGrid } from '../../shared/science/grid'
import shares from './values/cell-shares.json'
import reference from './values/other-definitions.json'

const axes = (lat: number[], lon: number[]): AxesGrid => ({
  kind: 'axes', rows: lat.length - 1, columns: lon.length - 1, latEdges: Float64Array.from(lat), lonEdges: Float64Array.from(lon),
})
const edges = (centres: number[]) => [centres[0]! - 7.5, ...centres.map((centre) => centre + 7.5)]

describe('GDAL, which takes a cell wholly or not at all', () => {
  const { lat, lon } = shares.grids['whole degrees, north first'] as { lat: number[]; lon: number[] }
  const grid = axes(lat, lon)
  const polygons = shares.polygons as unknown as Record<string, Polygon | MultiPolygon>

  const rasters: Record<string, { touched: number[]; centreInside: number[] }> = reference.rasters

  it.each(Object.entries(rasters))('%s: burns every cell that has a share, and more only where the outline merely touches one', (name, { touched, centreInside }) => {
    const found = cellShares(polygons[name]!, grid)
    const cells = [...found.index].filter((_, i) => found.share[i]! > 1e-12)
    expect(cells.filter((cell) => !touched.includes(cell))).toEqual([])
    const wholly = [...found.index].filter((_, i) => found.share[i]! > 1 - 1e-12)
    expect(wholly.filter((cell) => !centreInside.includes(cell))).toEqual([])
    expect(centreInside.filter((cell) => !cells.includes(cell))).toEqual([])
  })
})

describe('CDO over a box of whole cells', () => {
  const { box, field, meanByEllipsoid, meanBySphere, max } = reference.world
  const grid = axes(edges(reference.world.lat), edges(reference.world.lon))
  const [west, south, east, north] = box as [number, number, number, number]
  const outline: Polygon = { type: 'Polygon', coordinates: [[[west, south], [east, south], [east, north], [west, north], [west, south]]] }
  const { index, share } = cellShares(outline, grid)
  const values = Float64Array.from(index, (cell) => field[cell] ?? NaN)
  const figures = summarise({ values, share, areaKm2: cellAreasKm2(grid, index) })

  it('has the same mean when it is given the areas of the ellipsoid, and the same maximum', () => {
    expect(Math.abs(figures.mean! / meanByEllipsoid - 1)).toBeLessThan(1e-9)
    expect(Math.abs(figures.max! / max - 1)).toBeLessThan(1e-12)
  })

  it('by itself weighs by the areas of a sphere: up to half a percent apart', () => {
    expect(Math.abs(figures.mean! / meanBySphere - 1)).toBeLessThan(5e-3)
    expect(Math.abs(figures.mean! / meanBySphere - 1)).toBeGreaterThan(1e-7)
  })
})
