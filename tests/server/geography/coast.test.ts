import { describe, expect, it } from 'vitest'
import { distanceToLandKm } from '../../../server/geography/coast'
import { isLand } from '../../../server/geography/land'
import reference from '../../reference/values/coast-distance.json'

describe('the distance to the bundled land outline', () => {
  it.each(reference.items)('from $longitude, $latitude is what shapely finds in a plane of geodesic distances: $km km', ({ longitude, latitude, km }) => {
    const found = distanceToLandKm(longitude, latitude, 60)
    if (km === null) expect(found).toBe(Infinity)
    else expect(Math.abs(found / km - 1)).toBeLessThan(1e-3)
  })

  it('is 0 on land, the same in any turn of the longitude, and not given beyond what was asked for', () => {
    expect(isLand(-8, 53)).toBe(true)
    expect(distanceToLandKm(-8, 53, 5)).toBe(0)
    expect(distanceToLandKm(360 - 9.4, 51.3, 60)).toBeCloseTo(distanceToLandKm(-9.4, 51.3, 60), 9)
    expect(distanceToLandKm(-9.4, 51.3, 10)).toBe(Infinity)
    expect(distanceToLandKm(NaN, 51.3, 10)).toBeNaN()
  })
})
