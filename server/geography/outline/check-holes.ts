import type { Position } from 'geojson'
import { ringAreaKm2 } from '../../../shared/science/ring-area'
import { inRing } from './in-ring'
import { OutlineRefused, placeText } from './outline-refused'

/** Less than this share of the outline is nothing. */
const nothing = 1e-9

/** Before edges are compared: a hole that is as large as its outline would only be called a crossing. */
export function refuseHolesThatLeaveNothing([outer, ...holes]: readonly Position[][]): void {
  if (holes.length === 0) return
  const whole = ringAreaKm2(outer!)
  const left = holes.reduce((area, hole) => area - ringAreaKm2(hole), whole)
  const hole = holes.find((one) => one.every((point) => inOrOn(outer!, point)))
  if (hole && left <= whole * nothing) throw new OutlineRefused(`The holes leave nothing of the outline near ${placeText(hole[0]!)}.`, hole[0]!)
}

/** For rings that do not cross: every hole lies in its outline, and in no other hole. */
export function refuseMisplacedHoles([outer, ...holes]: readonly Position[][]): void {
  for (const [i, hole] of holes.entries()) {
    const outside = pointsOff(hole, outer!).find((point) => !inRing(outer!, point))
    if (outside) throw new OutlineRefused(`Hole ${i + 1} lies outside its outline near ${placeText(outside)}.`, outside)
    for (const [j, other] of holes.entries()) {
      if (j === i) continue
      const inside = pointsOff(hole, other).find((point) => inRing(other, point))
      if (inside) throw new OutlineRefused(`Holes ${Math.min(i, j) + 1} and ${Math.max(i, j) + 1} overlap near ${placeText(inside)}.`, inside)
    }
  }
}

/** Corners and middles of edges of one ring that do not lie on another. */
function pointsOff(ring: readonly Position[], other: readonly Position[]): Position[] {
  const points = ring.slice(0, -1).flatMap((from, i) => [from, [(from[0]! + ring[i + 1]![0]!) / 2, (from[1]! + ring[i + 1]![1]!) / 2]])
  return points.filter((point) => !isOn(other, point)).slice(0, 3)
}

function inOrOn(ring: readonly Position[], point: Position): boolean {
  return inRing(ring, point) || isOn(ring, point)
}

function isOn(ring: readonly Position[], [x = NaN, y = NaN]: Position): boolean {
  for (let i = 0; i + 1 < ring.length; i++) {
    const [x1 = NaN, y1 = NaN] = ring[i]!
    const [x2 = NaN, y2 = NaN] = ring[i + 1]!
    if (x < Math.min(x1, x2) - 1e-12 || x > Math.max(x1, x2) + 1e-12 || y < Math.min(y1, y2) - 1e-12 || y > Math.max(y1, y2) + 1e-12) continue
    const away = Math.abs((x2 - x1) * (y - y1) - (y2 - y1) * (x - x1)) / Math.hypot(x2 - x1, y2 - y1)
    if (away < 1e-12) return true
  }
  return false
}
