/** Places of cell corners, `(rows + 1) * (columns + 1)` row-major; NaN where unknown. */
export interface Corners {
  lats: Float64Array
  lons: Float64Array
}

type Place = readonly [lon: number, lat: number]

const nowhere: Place = [NaN, NaN]
/** Centres that lie this many degrees of longitude apart meet near a pole, where degrees are no measure of middles. */
const polarSpread = 60

/**
 * Corners half-way between the centres of the four cells round them; the outermost by mirroring. One missing centre is
 * made up for by the two beside it, more leave the corner without a place. Needs two rows and two columns.
 */
export function cornersFromCentres(lats: Float64Array, lons: Float64Array, rows: number, columns: number): Corners {
  const corners: Corners = {
    lats: new Float64Array((rows + 1) * (columns + 1)), lons: new Float64Array((rows + 1) * (columns + 1)),
  }
  const centre = (row: number, column: number): Place => {
    if (column < 0) return beyond(centre(row, 0), centre(row, 1))
    if (column >= columns) return beyond(centre(row, columns - 1), centre(row, columns - 2))
    if (row < 0) return beyond(centre(0, column), centre(1, column))
    if (row >= rows) return beyond(centre(rows - 1, column), centre(rows - 2, column))
    return [lons[row * columns + column]!, lats[row * columns + column]!]
  }
  for (let row = 0; row <= rows; row++) {
    for (let column = 0; column <= columns; column++) {
      const inner = row > 0 && row < rows && column > 0 && column < columns
      const [lon, lat] = (inner ? between(lats, lons, (row - 1) * columns + column - 1, columns) : null) ?? middle([
        centre(row - 1, column - 1), centre(row - 1, column), centre(row, column), centre(row, column - 1),
      ])
      corners.lons[row * (columns + 1) + column] = lon
      corners.lats[row * (columns + 1) + column] = Math.min(90, Math.max(-90, lat))
    }
  }
  return corners
}

/** The usual corner, far from poles and with four known centres, of which `first` is the one before; null for others. */
function between(lats: Float64Array, lons: Float64Array, first: number, columns: number): Place | null {
  const below = first + columns
  const lonA = lons[first]!
  const [b, c, d] = [near(lons[first + 1]!, lonA) - lonA, near(lons[below + 1]!, lonA) - lonA, near(lons[below]!, lonA) - lonA]
  const lat = (lats[first]! + lats[first + 1]! + lats[below + 1]! + lats[below]!) / 4
  if (!Number.isFinite(lat + b + c + d) || Math.max(0, b, c, d) - Math.min(0, b, c, d) > polarSpread) return null
  return [lonA + (b + c + d) / 4, lat]
}

function beyond(edge: Place, inner: Place): Place {
  return [2 * edge[0] - near(inner[0], edge[0]), 2 * edge[1] - inner[1]]
}

/** `round` holds four places in order round a corner. */
function middle(round: readonly Place[]): Place {
  const missing = round.findIndex(([lon, lat]) => !Number.isFinite(lon + lat))
  if (missing < 0) return mean(round)
  const beside = [round[(missing + 1) % 4]!, round[(missing + 3) % 4]!]
  const others = round.filter((_, i) => i !== missing)
  return others.every(([lon, lat]) => Number.isFinite(lon + lat)) ? mean(beside) : nowhere
}

function mean(places: readonly Place[]): Place {
  const first = places[0]![0]
  const lons = places.map(([lon]) => near(lon, first))
  if (Math.max(...lons) - Math.min(...lons) > polarSpread) return meanOnSphere(places)
  const n = places.length
  return [lons.reduce((a, b) => a + b) / n, places.reduce((sum, [, lat]) => sum + lat, 0) / n]
}

function meanOnSphere(places: readonly Place[]): Place {
  const radians = Math.PI / 180
  let [x, y, z] = [0, 0, 0]
  for (const [lon, lat] of places) {
    x += Math.cos(lat * radians) * Math.cos(lon * radians)
    y += Math.cos(lat * radians) * Math.sin(lon * radians)
    z += Math.sin(lat * radians)
  }
  return [Math.atan2(y, x) / radians, Math.atan2(z, Math.hypot(x, y)) / radians]
}

export function near(lon: number, reference: number): number {
  return lon - 360 * Math.round((lon - reference) / 360)
}

/** To a billionth of a degree, a tenth of a millimetre: what a grid as text keeps. In place: corners of large grids fill memory once. */
export function roundDegrees(degrees: Float64Array): Float64Array {
  // Adding 0 makes -0 a plain 0.
  for (let i = 0; i < degrees.length; i++) degrees[i] = Math.round(degrees[i]! * 1e9) / 1e9 + 0
  return degrees
}
