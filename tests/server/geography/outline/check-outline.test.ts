import type { Position } from 'geojson'
import geodesic from 'geographiclib-geodesic'
import { describe, expect, it } from 'vitest'
import { checkOutline } from '../../../../server/geography/outline/check-outline'
import { OutlineRefused } from '../../../../server/geography/outline/outline-refused'
import { cellShares } from '../../../../shared/science/cell-shares'
import type { AxesGrid } from '../../../../shared/science/grid'
import { areaBetweenParallelsKm2, cellAreaKm2 } from '../../../../shared/science/wgs84'
import published from '../../../reference/values/geodesy.json'

const polygon = (...coordinates: Position[][]) => ({ type: 'Polygon', coordinates })
const box = (west: number, south: number, east: number, north: number): Position[] => [[west, south], [east, south], [east, north], [west, north], [west, south]]
const sentence = (sent: unknown): string => {
  try {
    checkOutline(sent)
  } catch (error) {
    if (error instanceof OutlineRefused) return error.message
    throw error
  }
  return 'taken'
}

function world(step: number, from = -180): AxesGrid {
  const [rows, columns] = [180 / step, 360 / step]
  const latEdges = Float64Array.from({ length: rows + 1 }, (_, i) => 90 - i * step)
  const lonEdges = Float64Array.from({ length: columns + 1 }, (_, i) => from + i * step)
  return { kind: 'axes', rows, columns, latEdges, lonEdges }
}

/** Shares by centre of the cell, and the area they add up to. */
function onGrid(sent: unknown, grid: AxesGrid) {
  const { geometry } = checkOutline(sent)
  const { index, share } = cellShares(geometry, grid)
  const cells = new Map<string, number>()
  let areaKm2 = 0
  for (const [i, cell] of index.entries()) {
    const [row, column] = [Math.floor(cell / grid.columns), cell % grid.columns]
    const lon = (((grid.lonEdges[column]! % 360) + 360) % 360).toFixed(6)
    cells.set(`${lon} ${grid.latEdges[row]!.toFixed(6)}`, Number(share[i]!.toFixed(12)))
    areaKm2 += share[i]! * cellAreaKm2(grid, row, column)
  }
  return { cells: Object.fromEntries([...cells].sort()), areaKm2 }
}

describe('an outline across the 180th meridian', () => {
  // RFC 7946, section 3.1.9: the rectangle from 40 to 50 degrees north, 170 east to 170 west, cut at the antimeridian.
  const cut = {
    type: 'MultiPolygon',
    coordinates: [
      [[[180.0, 40.0], [180.0, 50.0], [170.0, 50.0], [170.0, 40.0], [180.0, 40.0]]],
      [[[-170.0, 40.0], [-170.0, 50.0], [-180.0, 50.0], [-180.0, 40.0], [-170.0, 40.0]]],
    ],
  }
  const spellings = {
    'in one ring, 170 to -170': polygon([[170, 40], [-170, 40], [-170, 50], [170, 50], [170, 40]]),
    'clockwise': polygon([[170, 40], [170, 50], [-170, 50], [-170, 40], [170, 40]]),
    'past 180': polygon(box(170, 40, 190, 50)),
    'before -180': polygon(box(-190, 40, -170, 50)),
    'with 180 written twice': polygon([[170, 40], [180, 40], [-180, 40], [-170, 40], [-170, 50], [-180, 50], [180, 50], [170, 50], [170, 40]]),
  }

  it.each(Object.entries(spellings))('is the same region %s as cut by RFC 7946 (3.1.9): one area, the same cells', (_, sent) => {
    const [one, other] = [checkOutline(sent), checkOutline(cut)]
    const expected = areaBetweenParallelsKm2(40, 50, 20)
    for (const { areaKm2, box: bounds, centreLongitude } of [one, other]) {
      expect(Math.abs(areaKm2 / expected - 1)).toBeLessThan(1e-12)
      expect(bounds).toEqual({ west: 170, south: 40, east: 190, north: 50 })
      expect(centreLongitude).toBe(180)
    }
    for (const grid of [world(3), world(3, 0), world(7.2, -180)]) expect(onGrid(sent, grid).cells).toEqual(onGrid(cut, grid).cells)
    for (const grid of [world(2.5), world(5, 0)]) {
      expect(onGrid(sent, grid).cells).toEqual(onGrid(cut, grid).cells)
      expect(Math.abs(onGrid(sent, grid).areaKm2 / expected - 1)).toBeLessThan(1e-9)
    }
  })

  it('says that the cut parts were joined', () => {
    expect(checkOutline(cut).geometry.type).toBe('Polygon')
    expect(checkOutline(cut).repairs).toEqual(['Parts that share an edge were joined.'])
  })

  it('the box of the Fijian archipelago of RFC 7946, 5.2, spans five degrees', () => {
    // "bbox": [177.0, -20.0, -178.0, -16.0]
    const [west, south, east, north] = [177, -20, -178, -16]
    const found = checkOutline(polygon([[west, south], [east, south], [east, north], [west, north], [west, south]]))
    expect(found.box).toEqual({ west: 177, south: -20, east: 182, north: -16 })
    expect(Math.abs(found.areaKm2 / areaBetweenParallelsKm2(-20, -16, 5) - 1)).toBeLessThan(1e-12)
    expect(found.repairs).toEqual(['It crosses the 180th meridian; its longitudes were written on beyond it.'])
  })

  it('keeps a hole on its far side', () => {
    const found = checkOutline(polygon([[170, 40], [-170, 40], [-170, 50], [170, 50], [170, 40]], box(-178, 44, -176, 46)))
    expect(new Set((found.geometry.coordinates[1] as Position[]).map(([lon]) => lon))).toEqual(new Set([182, 184]))
    expect(Math.abs(found.areaKm2 / (areaBetweenParallelsKm2(40, 50, 20) - areaBetweenParallelsKm2(44, 46, 2)) - 1)).toBeLessThan(1e-12)
  })
})

describe('an outline near or over a pole', () => {
  const cap = areaBetweenParallelsKm2(80, 90, 360)
  const spellings = {
    'as a ring of meridians round it': polygon(Array.from({ length: 13 }, (_, i) => [-180 + 30 * i, 80])),
    'the other way round': polygon(Array.from({ length: 13 }, (_, i) => [180 - 30 * i, 80])),
    'as the box of RFC 7946, 5.3': polygon(box(-180, 80, 180, 90)),
    'from 0 to 360': polygon(box(0, 80, 360, 90)),
    'stepping through 180 on the pole': polygon([[-180, 80], [-90, 80], [0, 80], [90, 80], [180, 80], [180, 90], [-180, 90], [-180, 80]]),
  }

  it.each(Object.entries(spellings))('holds the cap of 80 north, %s', (_, sent) => {
    const found = checkOutline(sent)
    expect(Math.abs(found.areaKm2 / cap - 1)).toBeLessThan(1e-12)
    for (const grid of [world(2.5), world(5, 0)]) expect(Math.abs(onGrid(sent, grid).areaKm2 / cap - 1)).toBeLessThan(1e-9)
  })

  it('says that a ring round a pole was closed, and takes the pole on its smaller side', () => {
    const south = checkOutline(polygon(Array.from({ length: 12 }, (_, i) => [15 + 30 * i - 180, -65 - (i % 2)])))
    expect(south.repairs).toContainEqual(expect.stringMatching(/^It goes round the South Pole and was closed along the meridian through 65.000 S, 165.000 W/))
    expect(south.box.south).toBe(-90)
    expect(south.marks.length).toBeGreaterThan(0)
  })

  it('follows the published cap round the North Pole to its area', () => {
    // Karney's Planimeter example, a square of geodesics at 89 degrees; here with its edges on the parallel, which holds more.
    const square = published.geodesicPolygons.items.find(({ id }) => id === 'P0')!
    const found = checkOutline(polygon(square.pts!.map(([lat, lon]) => [lon!, lat!])))
    expect(Math.abs(found.areaKm2 / areaBetweenParallelsKm2(89, 90, 360) - 1)).toBeLessThan(1e-12)
    expect(found.areaKm2 * 1e6).toBeGreaterThan(square.area_m2!)
  })

  it('is not taken with a hole round the pole', () => {
    expect(sentence(polygon(box(-180, 70, 180, 90), Array.from({ length: 13 }, (_, i) => [-180 + 30 * i, 80])))).toMatch(/^Hole 1 goes round a pole/)
  })
})

describe("Karney's published polygons of geodesics (Planimeter, GeographicLib's tests)", () => {
  const wgs84 = geodesic.Geodesic.WGS84
  const stepsPerEdge = 1_200
  /** Corners along the geodesics, longitudes as the library gives them: within -180..180, jumping at 180. */
  const followed = (corners: number[][]): Position[] =>
    corners.flatMap(([lat = NaN, lon = NaN], i) => {
      const [toLat = NaN, toLon = NaN] = corners[(i + 1) % corners.length]!
      const line = wgs84.InverseLine(lat, lon, toLat, toLon)
      return Array.from({ length: stepsPerEdge }, (_, step) => line.Position((line.s13 * step) / stepsPerEdge)).map(({ lat2, lon2 }): Position => [lon2!, lat2!])
    })

  it.each(published.geodesicPolygons.items.filter(({ pts }) => pts !== undefined))('$id, round a pole, through a pole or away from it, has its area', ({ pts, area_m2 }) => {
    const found = checkOutline(polygon(followed(pts!)), { inland: true })
    expect(Math.abs((found.areaKm2 * 1e6) / area_m2 - 1)).toBeLessThan(2e-6)
  })
})

describe('an outline as people send it', () => {
  const sea = box(-11.8, 50.2, -11.4, 50.6)

  it('may be a Feature, a FeatureCollection or a GeometryCollection with one area', () => {
    const geometry = polygon(sea)
    const feature = { type: 'Feature', properties: { name: 'x' }, geometry }
    for (const sent of [feature, { type: 'FeatureCollection', features: [feature] }, { type: 'GeometryCollection', geometries: [geometry] }]) {
      expect(checkOutline(sent).geometry).toEqual(geometry)
    }
    expect(sentence({ type: 'FeatureCollection', features: [feature, feature] })).toBe('One region has one outline; this collection holds 2 features. Import it to make several regions of it.')
  })

  it('is put right and says so: winding, heights, repeated points, an open ring; the map shows where', () => {
    const found = checkOutline(polygon([[-11.8, 50.2, 5], [-11.8, 50.6, 5], [-11.8, 50.6, 7], [-11.4, 50.6, 5], [-11.4, 50.2, 5]]))
    expect(found.repairs.sort()).toEqual([
      'Heights were left out.',
      'Its winding was turned round (RFC 7946: outlines run counter-clockwise, holes clockwise).',
      'Repeated points were left out.',
      'The outline was closed.',
    ])
    expect(found.marks).toEqual([
      { longitude: -11.8, latitude: 50.6, about: 'Repeated points were left out.' },
      { longitude: -11.8, latitude: 50.2, about: 'The outline was closed.' },
    ])
    expect(found.areaKm2).toBeCloseTo(areaBetweenParallelsKm2(50.2, 50.6, 0.4), 8)
  })

  it('may be smaller than a cell', () => {
    const found = checkOutline(polygon(box(-11.8001, 50.2, -11.8, 50.2001)))
    expect(found.repairs).toEqual([])
    const { index, share } = cellShares(found.geometry, world(1))
    expect(index).toHaveLength(1)
    expect(share[0]).toBeCloseTo(1e-8, 14)
  })

  it('joins parts that overlap: their water counts once', () => {
    const found = checkOutline({ type: 'MultiPolygon', coordinates: [[box(-12, 50, -11, 51)], [box(-11.5, 50, -10.5, 51)]] })
    expect(found.repairs).toEqual(['Parts that overlapped were joined; their water counts once.'])
    expect(found.geometry.type).toBe('Polygon')
    expect(Math.abs(found.areaKm2 / areaBetweenParallelsKm2(50, 51, 1.5) - 1)).toBeLessThan(1e-12)
  })

  it('keeps parts that lie apart or touch in a corner', () => {
    const apart = { type: 'MultiPolygon', coordinates: [[box(-13, 50, -12, 51)], [box(-12, 51, -11, 52)]] }
    expect(checkOutline(apart)).toMatchObject({ repairs: [], geometry: { type: 'MultiPolygon' } })
  })

  it('may touch itself in a corner, but not cross there', () => {
    const eight: Position[] = [[-14, 50], [-13, 51], [-12, 50], [-12, 52], [-13, 51], [-14, 52], [-14, 50]]
    expect(sentence(polygon(eight))).toBe('taken')
    const crossed: Position[] = [[-14, 50], [-13, 51], [-12, 52], [-12, 50], [-13, 51], [-14, 52], [-14, 50]]
    expect(sentence(polygon(crossed))).toBe('The outline crosses itself near 51.000 N, 13.000 W.')
  })
})

describe('an outline that cannot be taken', () => {
  const sea = box(-12, 50, -11, 51)

  it.each<[string, unknown, string | RegExp]>([
    ['a figure of eight', polygon([[-12, 50], [-11, 51], [-11, 50], [-12, 51], [-12, 50]]), 'The outline crosses itself near 50.500 N, 11.500 W.'],
    ['an edge that runs back on itself', polygon([[-12, 50], [-11, 50], [-11.5, 50], [-11.5, 51], [-12, 50]]), /^The outline crosses itself near 50.000 N, 11/],
    ['a line', polygon([[-12, 50], [-11.5, 50.5], [-11, 51], [-12, 50]]), 'The outline encloses no area: its points lie on one line.'],
    ['two points', polygon([[-12, 50], [-11, 51], [-12, 50]]), 'The outline needs at least three different points.'],
    ['latitude beyond the pole', polygon([[-12, 50], [-11, 50], [-11, 91], [-12, 50]]), 'Point 3 of the outline has latitude 91; latitudes lie between -90 and 90, and longitude comes first.'],
    ['longitude beyond a turn', polygon([[-12, 50], [400, 50], [-11, 51], [-12, 50]]), 'Point 2 of the outline has longitude 400; longitudes lie between -180 and 180.'],
    ['a null', polygon([[-12, 50], [null, 50], [-11, 51], [-12, 50]] as Position[]), 'Point 2 of the outline has no number for its longitude.'],
    ['text', polygon([[-12, 50], [-11, '50'], [-11, 51], [-12, 50]] as Position[]), 'Point 2 of the outline has text ("50") for its latitude; a number is needed.'],
    ['a point with one number', polygon([[-12, 50], [-11], [-11, 51], [-12, 50]]), 'Point 2 of the outline is no pair of longitude and latitude.'],
    ['null coordinates', { type: 'Polygon', coordinates: null }, 'The Polygon has no coordinates.'],
    ['a feature without geometry', { type: 'Feature', properties: {}, geometry: null }, 'The feature has no geometry.'],
    ['a Point', { type: 'Point', coordinates: [-12, 50] }, 'An outline is a Polygon or a MultiPolygon, not a Point: it encloses no water.'],
    ['a LineString', { type: 'LineString', coordinates: [[-12, 50], [-11, 51]] }, 'An outline is a Polygon or a MultiPolygon, not a LineString: it encloses no water.'],
    ['no GeoJSON at all', 'here', 'An outline is GeoJSON: a Polygon or a MultiPolygon.'],
    ['a hole outside', polygon(sea, box(-10, 50.2, -9.5, 50.5)), 'Hole 1 lies outside its outline near 50.200 N, 10.000 W.'],
    ['a hole across the edge', polygon(sea, box(-11.2, 50.2, -10.8, 50.5)), /^Hole 1 crosses the outline near 50.\d00 N, 11.000 W\.$/],
    ['a hole round the outline', polygon(sea, box(-13, 49, -10, 52)), /^Hole 1 lies outside its outline near/],
    ['a hole that leaves nothing', polygon(sea, sea), 'The holes leave nothing of the outline near 50.000 N, 12.000 W.'],
    ['a hole in a hole', polygon(sea, box(-11.8, 50.2, -11.2, 50.8), box(-11.6, 50.4, -11.4, 50.6)), /^Holes 1 and 2 overlap near 50.\d00 N, 11.\d00 W/],
    ['a fault in the second part', { type: 'MultiPolygon', coordinates: [[sea], [[[-20, 50], [-19, 51], [-19, 50], [-20, 51], [-20, 50]]]] }, 'Part 2 crosses itself near 50.500 N, 19.500 W.'],
    ['too many points', polygon(Array.from({ length: 6001 }, (_, i) => [-20 + Math.cos(i / 1000), 40 + Math.sin(i / 1000)])), 'The outline has 6,001 points; at most 5,000 can be taken. Simplify it first.'],
    ['land alone', polygon(box(8, 48, 9, 49)), /^The outline holds only land, near 48.000 N, 8.000 E, by the bundled coastline\./],
  ])('%s', (_, sent, expected) => {
    if (typeof expected === 'string') expect(sentence(sent)).toBe(expected)
    else expect(sentence(sent)).toMatch(expected)
  })

  it('names the place of its fault for the map', () => {
    const refused = (() => {
      try {
        return checkOutline(polygon([[-12, 50], [-11, 51], [-11, 50], [-12, 51], [-12, 50]]))
      } catch (error) {
        return error
      }
    })()
    expect(refused).toMatchObject({ place: [-11.5, 50.5], reason: null })
  })

  it('but a lake is taken once it is said to be one', () => {
    expect(checkOutline(polygon(box(8, 48, 9, 49)), { inland: true }).repairs).toEqual([])
  })

  it('a thousand corners are looked at in a few milliseconds a piece', () => {
    const ring = Array.from({ length: 4999 }, (_, i) => [-20 + 3 * Math.cos((2 * Math.PI * i) / 4999) * (1 + 0.01 * (i % 2)), 40 + 3 * Math.sin((2 * Math.PI * i) / 4999) * (1 + 0.01 * (i % 2))])
    expect(checkOutline(polygon([...ring, ring[0]!])).geometry.coordinates[0]).toHaveLength(5000)
  })
})
