import type { Position } from 'geojson'
import type { RegionGeometry } from '../../../shared/schemas/regions'
import { polygonAreaKm2 } from '../../../shared/science/ring-area'
import { areaIn } from './area-in'
import { refuseHolesThatLeaveNothing, refuseMisplacedHoles } from './check-holes'
import { joinParts } from './join-parts'
import { hasWater } from './has-water'
import { OutlineRefused, placeText } from './outline-refused'
import { capital, readRing } from './read-ring'
import { Repairs, type RepairMark } from './repairs'
import { selfCrossing } from './self-crossing'

export const mostVertices = 5_000
const mostParts = 500

export interface CheckedOutline {
  geometry: RegionGeometry
  areaKm2: number
  /** What was put right, in words, and where. */
  repairs: string[]
  marks: RepairMark[]
  box: { west: number; south: number; east: number; north: number }
  /** Within -180..180. */
  centreLongitude: number
}

/**
 * Takes an outline as sent, puts right what has one meaning, and throws `OutlineRefused` with a sentence and the place
 * for the rest; `inland` lets water pass that the bundled coastline does not know. The same water comes out the same, however it was spelled round the 180th meridian.
 */
export function checkOutline(sent: unknown, { inland = false } = {}): CheckedOutline {
  const repairs = new Repairs()
  const asSent = areaIn(sent).parts
  refuseTooMany(asSent)
  const parts = asSent.map((rings, p) => checkedPart(rings, asSent.length > 1 ? `part ${p + 1}` : '', repairs))
  const joined = inHomeTurn(joinParts(oneTurn(parts), repairs)).map((rings) => rings.map((ring, i) => wound(ring, i === 0 ? 1 : -1)))
  const geometry: RegionGeometry = joined.length === 1 ? { type: 'Polygon', coordinates: joined[0]! } : { type: 'MultiPolygon', coordinates: joined }
  const areaKm2 = polygonAreaKm2(geometry)
  if (!(areaKm2 > 1e-6)) throw new OutlineRefused('The outline encloses no area.', joined[0]?.[0]?.[0] ?? null)
  const box = boxOf(joined)
  if (!inland && !hasWater(joined, box)) {
    const at = joined[0]![0]![0]!
    throw new OutlineRefused(`The outline holds only land, near ${placeText(at)}, by the bundled coastline. That coastline knows no lakes and no inlets narrower than a few kilometres: if it is one, say so, and every cell in it counts as water.`, at, 'all-land')
  }
  return { geometry, areaKm2, repairs: [...repairs.texts], marks: repairs.marks, box, centreLongitude: (box.west + box.east) / 2 }
}

function refuseTooMany(parts: readonly unknown[]): void {
  let vertices = 0
  for (const rings of parts) for (const ring of Array.isArray(rings) ? (rings as unknown[]) : []) vertices += Array.isArray(ring) ? ring.length : 0
  const grouped = (count: number) => count.toLocaleString('en-GB')
  if (vertices > mostVertices) throw new OutlineRefused(`The outline has ${grouped(vertices)} points; at most ${grouped(mostVertices)} can be taken. Simplify it first.`)
  if (parts.length > mostParts) throw new OutlineRefused(`The outline has ${grouped(parts.length)} parts; at most ${mostParts} can be taken.`)
}

function checkedPart(sent: unknown, part: string, repairs: Repairs): Position[][] {
  if (!Array.isArray(sent) || sent.length === 0) throw new OutlineRefused(`${capital(part || 'the outline')} has no rings.`)
  const name = (i: number) => (i === 0 ? part || 'the outline' : `hole ${i}${part && ` of ${part}`}`)
  const read = (sent as unknown[]).map((ring, i) => readRing(ring, name(i), i > 0, repairs))
  for (const [i, ring] of read.entries()) if (isLine(ring)) throw new OutlineRefused(`${capital(name(i))} encloses no area: its points lie on one line.`, ring[0]!)
  const rings = inTurnOf(read)
  refuseHolesThatLeaveNothing(rings)
  const crossing = selfCrossing(rings)
  if (crossing) throw new OutlineRefused(crossingText(crossing.rings, crossing.at, name), crossing.at)
  refuseMisplacedHoles(rings)
  return rings.map((ring, i) => {
    const turned = wound(ring, i === 0 ? 1 : -1)
    if (turned !== ring) repairs.note('Its winding was turned round (RFC 7946: outlines run counter-clockwise, holes clockwise).')
    return turned
  })
}

function crossingText([a, b]: [number, number], at: Position, name: (i: number) => string): string {
  if (a === b) return `${capital(name(a))} crosses itself near ${placeText(at)}.`
  return `${capital(name(Math.max(a, b)))} crosses ${name(Math.min(a, b))} near ${placeText(at)}.`
}

function isLine(ring: readonly Position[]): boolean {
  const [x0, y0] = ring[0] as [number, number]
  const far = ring.reduce((best, [x, y]) => Math.max(best, Math.hypot(x! - x0, y! - y0)), 0)
  const end = ring.find(([x, y]) => Math.hypot(x! - x0, y! - y0) === far)!
  return ring.every(([x, y]) => Math.abs((end[0]! - x0) * (y! - y0) - (end[1]! - y0) * (x! - x0)) <= 1e-12 * far)
}

function wound(ring: Position[], sense: 1 | -1): Position[] {
  const [x0, y0] = ring[0] as [number, number]
  let twice = 0
  for (let i = 0; i + 1 < ring.length; i++) twice += (ring[i]![0]! - x0) * (ring[i + 1]![1]! - y0) - (ring[i + 1]![0]! - x0) * (ring[i]![1]! - y0)
  return Math.sign(twice) === sense ? ring : [...ring].reverse()
}

const middle = (ring: readonly Position[]) => {
  const lons = ring.map(([lon]) => lon!)
  return (lons.reduce((a, b) => Math.min(a, b)) + lons.reduce((a, b) => Math.max(a, b))) / 2
}
const moved = (ring: Position[], turn: number): Position[] => (turn === 0 ? ring : ring.map(([lon, lat]) => [lon! + turn, lat!]))

/** Holes may be written a turn away from their outline. */
function inTurnOf(rings: Position[][]): Position[][] {
  const home = middle(rings[0]!)
  return rings.map((ring) => moved(ring, -360 * Math.round((middle(ring) - home) / 360)))
}

/** Parts on both sides of the 180th meridian are brought into one turn of longitudes. */
function oneTurn(parts: Position[][][]): Position[][][] {
  const home = middle(parts[0]![0]!)
  return parts.map((rings) => rings.map((ring) => moved(ring, -360 * Math.round((middle(rings[0]!) - home) / 360))))
}

/** The middle of the whole lies above -180 and up to 180, so that its days are counted one way. */
function inHomeTurn(parts: Position[][][]): Position[][][] {
  const { west, east } = boxOf(parts)
  const turn = -360 * Math.ceil(((west + east) / 2 - 180) / 360)
  return parts.map((rings) => rings.map((ring) => moved(ring, turn)))
}

function boxOf(parts: readonly Position[][][]): CheckedOutline['box'] {
  const box = { west: Infinity, south: Infinity, east: -Infinity, north: -Infinity }
  for (const [lon = NaN, lat = NaN] of parts.flatMap((rings) => rings[0]!)) {
    box.west = Math.min(box.west, lon)
    box.east = Math.max(box.east, lon)
    box.south = Math.min(box.south, lat)
    box.north = Math.max(box.north, lat)
  }
  return box
}
