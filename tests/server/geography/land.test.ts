import { describe, expect, it } from 'vitest'
import { isLand, landMask } from '../../../server/geography/land'

describe('land', () => {
  it('knows land from water on both sides of the world and of the antimeridian', () => {
    const land = [[-8, 52.5], [10, 50], [-60, -10], [134, -25], [-175, 66.5], [177, 67], [179, 71.2], [0, -85], [-179.5, -85], [179.9, -88]]
    const water = [[-12, 52], [-30, 40], [0, 0], [175, 60], [-175, 60], [-179.9, 66.9 - 8], [-170, -60], [0, 89], [179.9, 50]]
    expect(land.filter(([lon = 0, lat = 0]) => !isLand(lon, lat))).toEqual([])
    expect(water.filter(([lon = 0, lat = 0]) => isLand(lon, lat))).toEqual([])
  })

  it('does not care how often the longitude goes round', () => {
    expect(isLand(352, 52.5)).toBe(true)
    expect(isLand(-368, 52.5)).toBe(true)
    expect(isLand(348, 52)).toBe(false)
  })

  it('answers a whole grid as it answers its points, whatever the order of its axes', () => {
    const latitudes = [71.3, 66.2, 53.05, 52.1, -16.5, -85]
    const longitudes = [350, 352.5, 355, 179.95, 180.05, -175, -10.2]
    const mask = landMask(latitudes, longitudes)
    const points = latitudes.flatMap((lat) => longitudes.map((lon) => (isLand(lon, lat) ? 1 : 0)))
    expect([...mask]).toEqual(points)
    expect(mask.some((cell) => cell === 1)).toBe(true)
    expect(mask.some((cell) => cell === 0)).toBe(true)
  })

  it('covers the share of the globe that is land', () => {
    const latitudes = Array.from({ length: 180 }, (_, i) => -89.5 + i)
    const longitudes = Array.from({ length: 360 }, (_, i) => -179.5 + i)
    const mask = landMask(latitudes, longitudes)
    let land = 0
    let all = 0
    latitudes.forEach((lat, row) => {
      const weight = Math.cos((lat * Math.PI) / 180)
      longitudes.forEach((_, column) => {
        all += weight
        land += weight * (mask[row * 360 + column] ?? 0)
      })
    })
    // Land with Antarctica's ice is 29.2 % of the Earth (149 of 510 million km2).
    expect(land / all).toBeGreaterThan(0.28)
    expect(land / all).toBeLessThan(0.3)
  })
})
