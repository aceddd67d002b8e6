import geodesic from 'geographiclib-geodesic'
import proj4 from 'proj4'
import { describe, expect, it } from 'vitest'
import { cellAreasKm2 } from '../../shared/science/cell-areas'
import type { TransformGrid } from '../../shared/science/grid'
import { polygonAreaKm2, ringAreaKm2 } from '../../shared/science/ring-area'
import { areaBetweenParallelsKm2, authalicRadiusKm, cellAreaKm2, semiMinorAxisM } from '../../shared/science/wgs84'
import published from './values/geodesy.json'

const wgs84 = geodesic.Geodesic.WGS84
const relative = (found: number, expected: number) => Math.abs(found / expected - 1)

/** A geodesic polygon as a longitude/latitude ring, its edges followed in small steps; longitudes run on. */
function followed(corners: readonly number[][], steps: number): number[][] {
  const ring: number[][] = []
  for (const [i, [lat = NaN, lon = NaN]] of corners.entries()) {
    const [toLat = NaN, toLon = NaN] = corners[(i + 1) % corners.length]!
    const line = wgs84.InverseLine(lat, lon, toLat, toLon)
    for (let step = 0; step < steps; step++) {
      const { lat2 = NaN, lon2 = NaN } = line.Position((line.s13 * step) / steps)
      const before = ring.at(-1)?.[0] ?? lon2
      ring.push([lon2 - 360 * Math.round((lon2 - before) / 360), lat2])
    }
  }
  return ring
}

const polygonsOffThePole = published.geodesicPolygons.items.filter(
  ({ id, pts }) => pts !== undefined && ['P2', 'P15'].includes(id),
)

describe('WGS84 areas', () => {
  it('the whole ellipsoid has its published area', () => {
    expect(relative(areaBetweenParallelsKm2(-90, 90, 360) * 1e6, published.wgs84.ellipsoid_area_m2)).toBeLessThan(1e-14)
    expect(authalicRadiusKm * 1000).toBeCloseTo(published.wgs84.authalic_radius_m, 5)
    expect(semiMinorAxisM).toBeCloseTo(published.wgs84.b, 8)
  })

  it.each(published.cells.oneDegree)('a one-degree cell from $south north', ({ south, ellipsoid_km2 }) => {
    expect(relative(areaBetweenParallelsKm2(south, south + 1, 1), ellipsoid_km2)).toBeLessThan(1e-9)
  })

  it.each(published.cells.fourKm)('a 1/24-degree cell centred at $centre', ({ centre, size_deg, ellipsoid_km2 }) => {
    const lat = [centre + size_deg / 2, centre - size_deg / 2]
    const [latEdges, lonEdges] = [Float64Array.from(lat), Float64Array.from([0, size_deg])]
    const found = cellAreaKm2({ kind: 'axes', rows: 1, columns: 1, latEdges, lonEdges }, 0, 0)
    expect(relative(found, ellipsoid_km2)).toBeLessThan(3e-9)
  })

  it('cells of a one-degree world add up to the ellipsoid', () => {
    let sum = 0
    for (let south = -90; south < 90; south++) sum += 360 * areaBetweenParallelsKm2(south, south + 1, 1)
    expect(relative(sum * 1e6, published.wgs84.ellipsoid_area_m2)).toBeLessThan(1e-13)
  })

  it('published boxes and caps between parallels', () => {
    const [box, cap] = published.rhumbPolygons.items
    expect(Math.floor((areaBetweenParallelsKm2(41, 45, 7) * 1e6) / 100)).toBe(2535883763)
    expect(box!.area_m2_published).toBe('2535883763xx')
    const circle = 66 + 33 / 60 + 44 / 3600
    expect(Math.floor((areaBetweenParallelsKm2(circle, 90, 360) * 1e6) / 100)).toBe(212084182523)
    expect(cap!.area_m2_published).toBe('212084182523xx')
  })

  it.each(published.geojsonBoxes.items)('a GeoJSON box over the date line, $box', ({ box, area_m2 }) => {
    const [west = NaN, south = NaN, east = NaN, north = NaN] = box
    const ring = [[west, south], [east + 360, south], [east + 360, north], [west, north], [west, south]]
    expect(relative(ringAreaKm2(ring) * 1e6, area_m2)).toBeLessThan(1e-11)
  })

  it.each(polygonsOffThePole)('geodesic polygon $id, its edges followed', ({ pts, area_m2 }) => {
    expect(relative(ringAreaKm2(followed(pts!, 20_000)) * 1e6, area_m2)).toBeLessThan(1e-10)
  })

  it('the octant of the ellipsoid, its pole written as a meridian and back', () => {
    const octant = [[0, 0], [90, 0], [90, 90], [0, 90], [0, 0]]
    const found = polygonAreaKm2({ type: 'Polygon', coordinates: [octant] })
    expect(Math.floor(found * 1e6)).toBe(63758202715511)
  })

  it('a square of 100 km in UTM zone 18, as one cell, measures what its geodesic outline measures', () => {
    const crs = '+proj=utm +zone=18 +datum=WGS84'
    const transform: TransformGrid['transform'] = [500000, 100000, 0, 4500000, 0, -100000]
    const grid: TransformGrid = { kind: 'transform', rows: 1, columns: 1, transform, crs }
    const utm = proj4(crs)
    const unproject = (x: number, y: number): [number, number] => utm.inverse([x, y]) as [number, number]
    const [area] = cellAreasKm2(grid, Uint32Array.of(0), unproject)
    const corners = published.utmSquare.corners_utm18n.map(([x = NaN, y = NaN]) => unproject(x, y).reverse())
    const polygon = wgs84.Polygon(false)
    for (const [lat = NaN, lon = NaN] of corners) polygon.AddPoint(lat, lon)
    expect(relative(polygon.Compute(false, true).area!, published.utmSquare.area_m2)).toBeLessThan(1e-10)
    // The sides are straight in UTM, no geodesics: the eastern one bows by 3 m in 100 km, 2e-5 of the area.
    expect(relative(area! * 1e6, published.utmSquare.area_m2)).toBeLessThan(2e-5)
    const outline = published.utmSquare.corners_utm18n.flatMap(([x1 = NaN, y1 = NaN], i, all) => {
      const [x2 = NaN, y2 = NaN] = all[(i + 1) % all.length]!
      return Array.from({ length: 1000 }, (_, s) => unproject(x1 + ((x2 - x1) * s) / 1000, y1 + ((y2 - y1) * s) / 1000))
    })
    expect(relative(area!, ringAreaKm2(outline))).toBeLessThan(2e-6)
  })
})
