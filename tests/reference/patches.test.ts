import { describe, expect, it } from 'vitest'
import { cellBox } from '../../shared/science/cell-box'
import { awayFrom, MiddleOf, nearestOf, type Place } from '../../server/geography/geodesic'
import { patchOutlines } from '../../shared/science/patch-outlines'
import { findPatches } from '../../shared/science/patches'
import { regionOutline } from '../../shared/science/region-outline'
import published from './values/geodesics.json'
import scipy from './values/patches.json'

describe('patches', () => {
  it.each(scipy.cases)('agree with scipy.ndimage.label on $rows x $columns cells at $level', ({ rows, columns, level, values, areaKm2, patches }) => {
    const seen = Float64Array.from(values as (number | null)[], (value) => value ?? NaN)
    const outline = regionOutline({ share: new Float64Array(seen.length).fill(1), areaKm2: Float64Array.from(areaKm2) })
    const box = cellBox(Uint32Array.from({ length: rows * columns }, (_, i) => i), columns, null)
    const found = findPatches(seen, outline, box, level)
    expect(found.patches).toHaveLength(patches.length)
    const rings = patchOutlines(found.labels, patches.length, box)
    for (const [i, expected] of patches.entries()) {
      expect(found.patches[i]).toMatchObject({ cells: expected.cells, greatest: expected.greatest })
      expect(found.patches[i]!.areaKm2).toBeCloseTo(expected.areaKm2, 9)
      expect(rings[i]).toHaveLength(expected.rings)
    }
  })
})

describe('distance and bearing', () => {
  it.each(published.inverse)('from $lat1, $lon1 to $lat2, $lon2', ({ lat1, lon1, azi1, lat2, lon2, s12 }) => {
    const away = awayFrom([lon1, lat1], [lon2, lat2])
    expect(away.km).toBeCloseTo(s12 / 1000, 9)
    expect(away.bearing).toBeCloseTo((azi1 + 360) % 360, 9)
  })

  it('the same place is 0 km away, in no direction', () => {
    expect(awayFrom([-10, 51], [350, 51])).toEqual({ km: 0, bearing: null })
  })

  it('the nearest of many places is the one with the shortest geodesic, wherever it lies', () => {
    const places = published.inverse.map(({ lat2, lon2 }): Place => [lon2, lat2])
    for (const { lat1, lon1 } of published.inverse) {
      const away = places.map((place) => awayFrom([lon1, lat1], place).km)
      expect(nearestOf([lon1, lat1], Float64Array.from(places, ([lon]) => lon), Float64Array.from(places, ([, lat]) => lat))!.at).toBe(away.indexOf(Math.min(...away)))
    }
    expect(nearestOf([0, 0], new Float64Array(0), new Float64Array(0))).toBeNull()
  })
})

describe('the middle of places', () => {
  const middle = (...places: Place[]) => places.reduce((sum, place) => sum.add(place, 1), new MiddleOf()).place()

  it('lies between them over the seam and over a pole', () => {
    const [longitude, latitude] = middle([179, 10], [-179, 10])!
    expect([Math.abs(longitude), latitude]).toEqual([180, expect.closeTo(10.0015, 3)])
    expect(middle([0, 89], [180, 89], [90, 89], [-90, 89])![1]).toBeCloseTo(90, 9)
  })

  it('is that of their weights, and none without places', () => {
    expect(new MiddleOf().add([0, 0], 3).add([4, 0], 1).place()![0]).toBeCloseTo(1, 2)
    expect(middle()).toBeNull()
  })
})
