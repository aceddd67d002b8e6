import { feature } from 'topojson-client'
import type { GeometryCollection, Topology } from 'topojson-specification'
import landTopology from 'world-atlas/land-50m.json'

/** One edge of a coastline; a ray to the east crosses it when `latLow <= lat < latHigh`. */
interface Edge {
  latLow: number
  latHigh: number
  lonAtLow: number
  lonPerLat: number
}

let bandsOnce: Edge[][] | undefined

/** Edges by whole degree of latitude, south to north: 180 bands, an edge stands in every band it touches. */
function edgeBands(): Edge[][] {
  if (bandsOnce) return bandsOnce
  const bands: Edge[][] = Array.from({ length: 180 }, () => [])
  for (const ring of landRings()) addRing(bands, ring)
  bandsOnce = bands
  return bands
}

/** Closed rings of the bundled land outline, longitude first; a ring that crosses the 180th meridian jumps there. */
export function landRings(): number[][][] {
  const topology = landTopology as unknown as Topology<{ land: GeometryCollection }>
  return feature(topology, topology.objects.land).features.flatMap(({ geometry }) => {
    if (geometry.type === 'Polygon') return geometry.coordinates
    return geometry.type === 'MultiPolygon' ? geometry.coordinates.flat() : []
  })
}

/**
 * A ring that crosses the antimeridian is cut there: its jumps become two edges each, and the cut sides are closed
 * along 180 degrees (down to the pole when the ring goes round it).
 */
function addRing(bands: Edge[][], ring: number[][]) {
  const cuts: number[] = []
  for (let i = 1; i < ring.length; i++) {
    const [lonA = 0, latA = 0] = ring[i - 1] ?? []
    const [lonB = 0, latB = 0] = ring[i] ?? []
    if (Math.abs(lonB - lonA) <= 180) {
      addEdge(bands, lonA, latA, lonB, latB)
      continue
    }
    const side = lonA > lonB ? 180 : -180
    const unwrapped = lonB + 2 * side
    const share = unwrapped === lonA ? 0.5 : (side - lonA) / (unwrapped - lonA)
    const cut = latA + share * (latB - latA)
    addEdge(bands, lonA, latA, side, cut)
    addEdge(bands, -side, cut, lonB, latB)
    cuts.push(cut)
  }
  if (cuts.length % 2 === 1) cuts.push((cuts[0] ?? 0) < 0 ? -90 : 90)
  cuts.sort((a, b) => a - b)
  for (let i = 0; i + 1 < cuts.length; i += 2) {
    addEdge(bands, 180, cuts[i] ?? 0, 180, cuts[i + 1] ?? 0)
    addEdge(bands, -180, cuts[i] ?? 0, -180, cuts[i + 1] ?? 0)
  }
}

function addEdge(bands: Edge[][], lonA: number, latA: number, lonB: number, latB: number) {
  if (latA === latB) return
  const lonPerLat = (lonB - lonA) / (latB - latA)
  const edge =
    latA < latB
      ? { latLow: latA, latHigh: latB, lonAtLow: lonA, lonPerLat }
      : { latLow: latB, latHigh: latA, lonAtLow: lonB, lonPerLat }
  for (let band = bandOf(edge.latLow); band <= bandOf(edge.latHigh); band++) bands[band]?.push(edge)
}

function bandOf(latitude: number): number {
  return Math.min(179, Math.max(0, Math.floor(latitude + 90)))
}

/** Longitudes where the parallel `latitude` crosses a coast, ascending: land lies between the 1st and 2nd, 3rd and 4th... */
function crossings(latitude: number): number[] {
  const found: number[] = []
  for (const edge of edgeBands()[bandOf(latitude)] ?? []) {
    if (latitude < edge.latLow || latitude >= edge.latHigh) continue
    found.push(edge.lonAtLow + (latitude - edge.latLow) * edge.lonPerLat)
  }
  return found.sort((a, b) => a - b)
}

function wrapped(longitude: number): number {
  return longitude >= -180 && longitude < 180 ? longitude : longitude - 360 * Math.floor((longitude + 180) / 360)
}

/**
 * Whether a point is on land by the bundled 1:50 million outline (Natural Earth through world-atlas). Degrees, any
 * turn of the longitude. The outline is good to a few kilometres; lakes count as land.
 */
export function isLand(longitude: number, latitude: number): boolean {
  const lon = wrapped(longitude)
  let inside = false
  for (const edge of edgeBands()[bandOf(latitude)] ?? []) {
    if (latitude < edge.latLow || latitude >= edge.latHigh) continue
    if (edge.lonAtLow + (latitude - edge.latLow) * edge.lonPerLat > lon) inside = !inside
  }
  return inside
}

/**
 * 1 where a cell's centre is on land, else 0; row-major over `latCentres` x `lonCentres` in the order given, degrees.
 * One sweep a row, so a global grid costs little more than its own size.
 */
export function landMask(latCentres: ArrayLike<number>, lonCentres: ArrayLike<number>): Uint8Array {
  const columns = lonCentres.length
  const mask = new Uint8Array(latCentres.length * columns)
  const lons = Float64Array.from(lonCentres, wrapped)
  const order = Array.from(lons.keys()).sort((a, b) => (lons[a] ?? 0) - (lons[b] ?? 0))
  for (let row = 0; row < latCentres.length; row++) {
    const cuts = crossings(latCentres[row] ?? Number.NaN)
    let passed = 0
    for (const column of order) {
      while (passed < cuts.length && (cuts[passed] ?? 0) <= (lons[column] ?? 0)) passed++
      mask[row * columns + column] = (cuts.length - passed) % 2
    }
  }
  return mask
}
