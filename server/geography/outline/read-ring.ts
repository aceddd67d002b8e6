import type { Position } from 'geojson'
import { ringAreaKm2 } from '../../../shared/science/ring-area'
import { OutlineRefused, placeText } from './outline-refused'
import type { Repairs } from './repairs'
import { selfCrossing } from './self-crossing'

/**
 * One ring as sent, made a closed ring of longitude and latitude whose longitudes run on without a jump. `name` says
 * which ring it is, for sentences. A step of more than half the globe is a step across the 180th meridian; one of a
 * whole turn is the same place written twice, or a whole parallel where the ring would make no sense otherwise. A ring that comes back a whole turn away goes round a pole and is closed along it.
 */
export function readRing(sent: unknown, name: string, isHole: boolean, repairs: Repairs): Position[] {
  if (!Array.isArray(sent)) throw new OutlineRefused(`${capital(name)} is no list of points.`)
  const places = (sent as unknown[]).map((one, i) => position(one, `Point ${i + 1} of ${name}`, repairs))
  let run = runOn(places, false)
  if (run.wholeTurns && !isSound(run.points)) run = runOn(places, true)
  const points: Position[] = []
  for (const point of run.points) {
    const before = points.at(-1)
    if (before && before[0] === point[0] && before[1] === point[1]) repairs.note('Repeated points were left out.', point)
    else points.push(point)
  }
  if (run.turned) repairs.note('It crosses the 180th meridian; its longitudes were written on beyond it.')
  return closed(points, name, isHole, repairs)
}

interface Run {
  points: Position[]
  /** Whether whole turns were added. */
  turned: boolean
  /** Whether a step of exactly a whole turn was met, away from the poles. */
  wholeTurns: boolean
}

function runOn(places: readonly (readonly [number, number])[], keepWholeTurns: boolean): Run {
  const run: Run = { points: [], turned: false, wholeTurns: false }
  let turn = 0
  for (const [lon, lat] of places) {
    const before = run.points.at(-1)
    const step = before ? lon + turn - before[0]! : 0
    const whole = step !== 0 && step % 360 === 0
    const alongPole = whole && before![1] === lat && Math.abs(lat) === 90
    if (whole && !alongPole) run.wholeTurns = true
    if (Math.abs(step) > 180 && !alongPole && !(whole && keepWholeTurns)) turn -= 360 * Math.round(step / 360)
    if (turn !== 0) run.turned = true
    run.points.push([lon + turn, lat])
  }
  return run
}

/** Whether points make a ring that encloses something and does not cross itself. */
function isSound(points: readonly Position[]): boolean {
  const ring = points.filter((point, i) => i === 0 || String(point) !== String(points[i - 1]))
  if (new Set(ring.map(([lon]) => lon)).size < 2 || new Set(ring.map(([, lat]) => lat)).size < 2) return false
  const isClosed = String(ring[0]) === String(ring.at(-1))
  return selfCrossing([isClosed ? ring : [...ring, ring[0]!]]) === null
}

function position(sent: unknown, name: string, repairs: Repairs): [number, number] {
  if (!Array.isArray(sent) || sent.length < 2) throw new OutlineRefused(`${name} is no pair of longitude and latitude.`)
  const [lon, lat] = [number(sent[0], 'longitude', name), number(sent[1], 'latitude', name)]
  if (lat < -90 || lat > 90) throw new OutlineRefused(`${name} has latitude ${lat}; latitudes lie between -90 and 90, and longitude comes first.`)
  if (lon < -360 || lon > 360) throw new OutlineRefused(`${name} has longitude ${lon}; longitudes lie between -180 and 180.`)
  if (sent.length > 2) repairs.note('Heights were left out.')
  return [lon, lat]
}

function number(value: unknown, axis: string, name: string): number {
  if (typeof value === 'number' && Number.isFinite(value)) return value
  if (typeof value === 'string') throw new OutlineRefused(`${name} has text ("${value.slice(0, 20)}") for its ${axis}; a number is needed.`)
  throw new OutlineRefused(`${name} has no number for its ${axis}.`)
}

function closed(points: Position[], name: string, isHole: boolean, repairs: Repairs): Position[] {
  const [first, last] = [points[0], points.at(-1)]
  if (!first || !last || new Set(points.map(String)).size < 3) throw new OutlineRefused(`${capital(name)} needs at least three different points.`, first ?? null)
  const around = last[0]! - first[0]! + (sameSpot(first, last) ? 0 : stepBetween(last[0]!, first[0]!))
  // With the pole among its points it is closed already, along a parallel.
  const reachesPole = points.some(([, lat]) => Math.abs(lat!) === 90)
  if (Math.abs(around) > 359.999 && !reachesPole) return closedAlongPole(sameSpot(first, last) ? points.slice(0, -1) : points, Math.round(around / 360) * 360, name, isHole, repairs)
  if (first[0] === last[0] && first[1] === last[1]) return points
  if (reachesPole && sameSpot(first, last)) return [...points, [...first]]
  repairs.note('The outline was closed.', first)
  return [...points, [...first]]
}

/** The same place, whole turns of longitude apart or not. */
function sameSpot(a: Position, b: Position): boolean {
  return a[1] === b[1] && Math.abs((a[0]! - b[0]!) % 360) < 1e-9
}

function stepBetween(from: number, to: number): number {
  const step = to - from
  return step - 360 * Math.round(step / 360)
}

/** The pole on the smaller side is the one meant. */
function closedAlongPole(points: Position[], around: number, name: string, isHole: boolean, repairs: Repairs): Position[] {
  const first = points[0]!
  if (Math.abs(around) > 360) throw new OutlineRefused(`${capital(name)} goes round the globe more than once.`, first)
  if (isHole) throw new OutlineRefused(`${capital(name)} goes round a pole. Cut the water along a meridian into two parts instead.`, first)
  const along = (pole: number): Position[] => [...points, [first[0]! + around, first[1]!], [first[0]! + around, pole], [first[0]!, pole], [...first]]
  const north = ringAreaKm2(along(90)) <= ringAreaKm2(along(-90))
  const end: Position = [first[0]!, north ? 90 : -90]
  repairs.note(`It goes round the ${north ? 'North' : 'South'} Pole and was closed along the meridian through ${placeText(first)}, up to the pole.`, first)
  return along(end[1]!)
}

export function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}
