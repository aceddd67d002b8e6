import { expect, test } from 'vitest'
import { cutAtAntimeridian } from '../../../src/components/map/cut-at-antimeridian'
import { stepMinutes, stepsWithin } from '../../../src/components/map/graticule-steps'
import { placePlates, type Anchor } from '../../../src/components/map/place-plates'

const longestStep = (rings: readonly (readonly (readonly number[])[])[]) =>
  Math.max(...rings.flatMap((ring) => ring.map((point, i) => Math.abs((point[0] ?? 0) - (ring.at(i - 1)?.[0] ?? 0)))))

test('an island on the 180th meridian becomes two that touch it', () => {
  const pieces = cutAtAntimeridian([[178, 10], [-178, 10], [-178, 12], [178, 12], [178, 10]])
  expect(pieces).toHaveLength(2)
  expect(longestStep(pieces)).toBeLessThanOrEqual(2)
  const longitudes = pieces.map((ring) => [Math.min(...ring.map((p) => p[0])), Math.max(...ring.map((p) => p[0]))])
  expect(longitudes).toEqual([[178, 180], [-180, -178]])
})

test('a ring round the pole is closed along the pole', () => {
  const ring = [-180, -90, 0, 90, 180].map((longitude) => [longitude, -70])
  const pieces = cutAtAntimeridian(ring).filter((piece) => longestStep([piece]) > 0)
  expect(pieces).toHaveLength(1)
  expect(pieces.flat().some(([, latitude]) => latitude === -90)).toBe(true)
})

test('a ring that crosses nothing stays as it is', () => {
  expect(cutAtAntimeridian([[0, 0], [2, 0], [2, 2], [0, 0]])).toEqual([[[0, 0], [2, 0], [2, 2], [0, 0]]])
})

test('segments are whole minutes of arc, wide enough to be counted', () => {
  expect(stepMinutes(100, 14)).toBe(10)
  expect(stepsWithin(-0.2, 0.4, 10).map((s) => [Number(s.at.toFixed(3)), s.inked])).toEqual([
    [-0.333, true],
    [-0.167, false],
    [0, true],
    [0.167, false],
    [0.333, true],
  ])
})

test('plates keep clear of each other, of the scale bar and of the edge', () => {
  const square = (x: number, y: number): [number, number][] => [[x, y], [x + 60, y], [x + 60, y + 60], [x, y + 60]]
  const anchors: Anchor[] = [square(80, 80), square(160, 90), square(100, 170), square(300, 220)].map((outline, id) => ({ id, outline, width: 110, height: 40 }))
  const scaleBar = { x: 340, y: 260, width: 160, height: 60 }
  const plates = placePlates(anchors, { width: 500, height: 320 }, [scaleBar])
  expect(plates).toHaveLength(4)
  const apart = (a: { x: number; y: number; width: number; height: number }, b: typeof a) =>
    a.x + a.width <= b.x || b.x + b.width <= a.x || a.y + a.height <= b.y || b.y + b.height <= a.y
  plates.forEach((plate, i) => {
    expect(apart(plate, scaleBar)).toBe(true)
    expect(plate.x).toBeGreaterThanOrEqual(0)
    expect(plate.x + plate.width).toBeLessThanOrEqual(500)
    plates.slice(i + 1).forEach((other) => expect(apart(plate, other)).toBe(true))
  })
})
