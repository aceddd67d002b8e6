import type { AxesGrid } from './grid'

/** WGS84 by its two defining numbers; the rest follows from them. */
export const semiMajorAxisM = 6378137
export const flattening = 1 / 298.257223563
export const semiMinorAxisM = semiMajorAxisM * (1 - flattening)
export const eccentricitySquared = flattening * (2 - flattening)
const eccentricity = Math.sqrt(eccentricitySquared)

/**
 * Area in km2, per radian of longitude, between the equator and a latitude in degrees; negative in the south.
 * q(phi) = b2/2 [ s/(1 - e2 s2) + atanh(e s)/e ], s = sin phi: the exact integral over the ellipsoid.
 */
export function areaToEquatorKm2(latDeg: number): number {
  const s = Math.sin((latDeg * Math.PI) / 180)
  const es = eccentricity * s
  const bracket = s / (1 - es * es) + Math.atanh(es) / eccentricity
  return (semiMinorAxisM * semiMinorAxisM * bracket) / 2e6
}

/** Radius in km of the sphere with the ellipsoid's area. */
export const authalicRadiusKm = Math.sqrt(areaToEquatorKm2(90))

/**
 * Ellipsoid area in km2 between two parallels, over `widthDeg` degrees of longitude. Exact. The order of the two
 * parallels does not matter. Latitudes beyond the poles are a RangeError.
 */
export function areaBetweenParallelsKm2(southDeg: number, northDeg: number, widthDeg: number): number {
  if (!(Math.abs(southDeg) <= 90 && Math.abs(northDeg) <= 90)) {
    throw new RangeError(`A latitude lies between -90 and 90 degrees, not ${southDeg} or ${northDeg}.`)
  }
  const perRadian = areaToEquatorKm2(northDeg) - areaToEquatorKm2(southDeg)
  return Math.abs((perRadian * widthDeg * Math.PI) / 180)
}

/** Area in km2 of one cell of an axes grid. A cell outside the grid is a RangeError. */
export function cellAreaKm2(grid: AxesGrid, row: number, column: number): number {
  const [south, north] = [grid.latEdges[row], grid.latEdges[row + 1]]
  const [west, east] = [grid.lonEdges[column], grid.lonEdges[column + 1]]
  if (south === undefined || north === undefined || west === undefined || east === undefined) {
    throw new RangeError(`The grid of ${grid.rows} x ${grid.columns} cells has no cell ${row}, ${column}.`)
  }
  return areaBetweenParallelsKm2(south, north, east - west)
}
