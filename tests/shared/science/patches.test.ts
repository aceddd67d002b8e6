import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { cellBox, columnsRound } from '../../../shared/science/cell-box'
import { summarise } from '../../../shared/science/figures'
import { patchChanges } from '../../../shared/science/patch-changes'
import { patchOutlines } from '../../../shared/science/patch-outlines'
import { findPatches, type Patches } from '../../../shared/science/patches'
import { regionOutline } from '../../../shared/science/region-outline'
import { grid, type SmallGrid } from './small-grid'

interface Wish {
  round?: number | null
  minimum?: number
  water?: number[]
  share?: number[]
}

/** A region that is the whole small grid, each cell 1 km2. */
function patchesOf({ grid: { rows, columns }, values }: SmallGrid, level: number, { round = null, minimum = 1, water, share }: Wish = {}) {
  const index = Uint32Array.from({ length: rows * columns }, (_, i) => i)
  const outline = regionOutline({
    share: share ? Float64Array.from(share) : new Float64Array(index.length).fill(1),
    areaKm2: new Float64Array(index.length).fill(1),
    ...(water ? { water: Uint8Array.from(water) } : {}),
  })
  const box = cellBox(index, columns, round)
  return { ...findPatches(values, outline, box, level, minimum), box, values, weightKm2: outline.weightKm2 }
}

const areas = ({ patches }: Patches) => patches.map((patch) => patch.areaKm2)
const sum = (list: readonly number[]) => list.reduce((a, b) => a + b, 0)

describe('patches above a level', () => {
  it('join over edges and over corners', () => {
    const found = patchesOf(grid`5 1 1 7 / 1 6 1 1 / 1 1 1 9 / 1 1 1 9`, 5)
    expect(areas(found)).toEqual([2, 2, 1])
    expect(found.patches.map((patch) => patch.greatest)).toEqual([9, 6, 7])
    expect([...found.labels].map((label) => (label < 0 ? '.' : label)).join('')).toBe('1..2.1.....0...0')
  })

  it('hold what is at the level, and name the cell of the greatest value, the first of equals', () => {
    const { patches } = patchesOf(grid`1 2 8 8 1`, 2)
    expect(patches).toMatchObject([{ cells: 3, greatest: 8, greatestAt: 2 }])
  })

  it('keep their holes: a hole belongs to nobody, an island in it is another patch', () => {
    const found = patchesOf(grid`3 3 3 3 3 / 3 1 1 1 3 / 3 1 4 1 3 / 3 1 1 1 3 / 3 3 3 3 3`, 3)
    expect(areas(found)).toEqual([16, 1])
    expect(patchOutlines(found.labels, 2, found.box).map((rings) => rings.length)).toEqual([2, 1])
  })

  it('are none where nothing reaches the level, where nothing was seen, and where there are no cells', () => {
    expect(patchesOf(grid`1 1 / 1 ·`, 2).patches).toEqual([])
    expect(patchesOf(grid`· · / · ·`, 2).patches).toEqual([])
    const nothing = { share: new Float64Array(0), areaKm2: new Float64Array(0) }
    expect(findPatches(new Float64Array(0), regionOutline(nothing), cellBox(new Uint32Array(0), 7, null), 1).patches).toEqual([])
  })

  it('join over the seam of a full circle, and only there', () => {
    const sides = grid`5 1 1 5 / 1 1 1 1 / 1 1 1 5 / 5 1 1 1`
    expect(areas(patchesOf(sides, 5, { round: 4 }))).toEqual([2, 2])
    expect(areas(patchesOf(sides, 5))).toEqual([1, 1, 1, 1])
  })

  it('touch the edge of the region where the water may go on: beside its last cell, or in a cell that it cuts', () => {
    const inner = grid`1 1 1 1 / 1 5 1 1 / 1 1 1 5 / 1 1 1 1 / 1 1 1 1`
    expect(patchesOf(inner, 5).patches.map((patch) => patch.touchesEdge)).toEqual([false, true])
    const cut = new Array<number>(20).fill(1)
    cut[5] = 0.5
    expect(patchesOf(inner, 5, { share: cut }).patches.map((patch) => [patch.areaKm2, patch.touchesEdge])).toEqual([[1, true], [0.5, true]])
  })

  it('touch unseen water, but not land', () => {
    const cloudy = grid`1 1 1 1 / 1 5 1 1 / 1 1 · 1 / 1 1 1 1`
    expect(patchesOf(cloudy, 5).patches).toMatchObject([{ touchesUnseen: true, touchesEdge: false }])
    const water = new Array<number>(16).fill(1)
    water[10] = 0
    expect(patchesOf(cloudy, 5, { water }).patches).toMatchObject([{ touchesUnseen: false, touchesEdge: false }])
  })

  it('smaller than the minimum are dropped, and it is said how much that was', () => {
    const found = patchesOf(grid`5 1 5 / 1 1 1 / 5 5 1`, 5, { minimum: 2 })
    expect(areas(found)).toEqual([2])
    expect(found.dropped).toEqual({ patches: 2, cells: 2, areaKm2: 2 })
    expect([...found.labels].filter((label) => label >= 0)).toEqual([0, 0])
  })

  it('a 5 km patch in 500 km2 is found though the median is usual', () => {
    const values = new Float64Array(20 * 25).fill(0.4)
    for (let row = 9; row < 14; row++) for (let column = 16; column < 21; column++) values[row * 25 + column] = 7
    const share = new Float64Array(500).fill(1)
    expect(summarise({ values, share, areaKm2: share })).toMatchObject({ median: 0.4, p90: 0.4, max: 7 })
    const box = cellBox(Uint32Array.from({ length: 500 }, (_, i) => i), 25, null)
    expect(findPatches(values, regionOutline({ share, areaKm2: share }), box, 1).patches).toEqual([
      { areaKm2: 25, cells: 25, greatest: 7, greatestAt: 9 * 25 + 16, touchesEdge: false, touchesUnseen: false },
    ])
  })

  it('a level that is no number and lists of two lengths are refused', () => {
    expect(() => patchesOf(grid`1`, NaN)).toThrow(RangeError)
    const one = { share: new Float64Array(1), areaKm2: new Float64Array(1) }
    expect(() => findPatches(new Float64Array(2), regionOutline(one), cellBox(Uint32Array.of(0), 1, null), 1)).toThrow(RangeError)
  })
})

const fields = fc.tuple(fc.integer({ min: 1, max: 12 }), fc.integer({ min: 1, max: 12 })).chain(([rows, columns]) =>
  fc.array(fc.oneof(fc.constant(NaN), fc.integer({ min: 0, max: 9 })), { minLength: rows * columns, maxLength: rows * columns }).map((cells): SmallGrid => {
    const { latEdges, lonEdges } = grid`1`.grid
    return { grid: { kind: 'axes', rows, columns, latEdges, lonEdges }, values: Float64Array.from(cells) }
  }),
)

function turned({ grid: { rows, columns, ...rest }, values }: SmallGrid): SmallGrid {
  const turnedValues = Float64Array.from(values, (_, i) => values[(rows - 1 - (i % rows)) * columns + Math.floor(i / rows)]!)
  return { grid: { ...rest, rows: columns, columns: rows }, values: turnedValues }
}

describe('of any field', () => {
  it('areas add up to the area above the level', () => {
    fc.assert(fc.property(fields, fc.integer({ min: 0, max: 10 }), fc.integer({ min: 1, max: 4 }), (field, level, minimum) => {
      const found = patchesOf(field, level, { minimum })
      expect(sum(areas(found)) + found.dropped.areaKm2).toBe(field.values.filter((value) => value >= level).length)
    }))
  })

  it('turned by quarters, the patches stay the same', () => {
    fc.assert(fc.property(fields, (field) => {
      const facts = (one: SmallGrid) =>
        patchesOf(one, 5).patches.map(({ areaKm2, greatest, touchesEdge, touchesUnseen }) => `${areaKm2} ${greatest} ${touchesEdge} ${touchesUnseen}`).sort()
      const first = facts(field)
      let one = field
      for (let quarter = 0; quarter < 4; quarter++) {
        one = turned(one)
        expect(facts(one)).toEqual(first)
      }
      expect([...one.values]).toEqual([...field.values])
    }))
  })

  it('a lower level never loses area, and no patch is parted by it', () => {
    fc.assert(fc.property(fields, fc.integer({ min: 1, max: 9 }), (field, level) => {
      const [high, low] = [patchesOf(field, level), patchesOf(field, level - 1)]
      expect(sum(areas(low))).toBeGreaterThanOrEqual(sum(areas(high)))
      const joinedIn = high.patches.map(() => new Set<number>())
      for (const [i, label] of high.labels.entries()) if (label >= 0) joinedIn[label]!.add(low.labels[i]!)
      for (const set of joinedIn) expect(set.size).toBe(1)
    }))
  })

  it('outlines close, and hold as much as the patch, holes taken out', () => {
    fc.assert(fc.property(fields, fc.boolean(), (field, everyCorner) => {
      const found = patchesOf(field, 5)
      for (const [label, rings] of patchOutlines(found.labels, found.patches.length, found.box, everyCorner).entries()) {
        const inside = rings.map((ring) => {
          expect(ring.at(-1)).toEqual(ring[0])
          return sum(ring.slice(1).map(([row, column], i) => (ring[i]![1] - column) * (ring[i]![0] + row) * 0.5))
        })
        expect(sum(inside)).toBeCloseTo(found.patches[label]!.cells, 9)
      }
    }))
  })

  it('what became of each patch adds up to the change of the whole', () => {
    fc.assert(fc.property(fields, fc.infiniteStream(fc.oneof(fc.constant(NaN), fc.integer({ min: 0, max: 9 }))), (field, stream) => {
      const before = patchesOf({ ...field, values: Float64Array.from(field.values, () => stream.next().value!) }, 5)
      const now = patchesOf(field, 5)
      const families = patchChanges(before, now, Int32Array.from(field.values.keys()), now.weightKm2)
      expect(sum(families.map((family) => family.nowKm2 - family.beforeKm2))).toBe(sum(areas(now)) - sum(areas(before)))
      expect(families.flatMap((family) => family.now).sort((a, b) => a - b)).toEqual([...now.patches.keys()])
      expect(families.flatMap((family) => family.before).sort((a, b) => a - b)).toEqual([...before.patches.keys()])
    }))
  })
})

describe('what became of a patch', () => {
  const change = (before: SmallGrid, now: SmallGrid) => {
    const [then, here] = [patchesOf(before, 5), patchesOf(now, 5)]
    return patchChanges(then, here, Int32Array.from(now.values.keys()), here.weightKm2).map(({ kind, beforeKm2, nowKm2 }) => [kind, beforeKm2, nowKm2])
  }

  it('it grew, shrank, or stayed', () => {
    expect(change(grid`5 5 1 1`, grid`1 5 5 5`)).toEqual([['grown', 2, 3]])
    expect(change(grid`1 5 5 5`, grid`1 1 5 1`)).toEqual([['shrunk', 3, 1]])
    expect(change(grid`5 5 1 1`, grid`6 6 1 1`)).toEqual([['steady', 2, 2]])
  })

  it('it is new, or gone', () => {
    expect(change(grid`1 1 1 5`, grid`5 5 1 1`)).toEqual([['new', 0, 2], ['gone', 1, 0]])
  })

  it('it joined, parted, or both', () => {
    expect(change(grid`5 1 5`, grid`5 5 5`)).toEqual([['joined', 2, 3]])
    expect(change(grid`5 5 5`, grid`5 1 5`)).toEqual([['parted', 3, 2]])
    expect(change(grid`5 5 5 1 5`, grid`5 1 5 5 5`)).toEqual([['joined and parted', 4, 4]])
  })

  it('nobody knows where its water was not seen the other time', () => {
    expect(change(grid`· · 1 1`, grid`5 5 1 1`)).toEqual([['not seen before', 0, 2]])
    expect(change(grid`5 5 1 1`, grid`· · 1 1`)).toEqual([['not seen now', 2, 0]])
  })
})

describe('the rectangle round the cells of a region', () => {
  it('goes on over the seam of a full circle, and is no wider than it must be', () => {
    expect(cellBox(Uint32Array.of(0, 9, 10, 18), 10, 10)).toMatchObject({ top: 0, left: 8, rows: 2, columns: 3, closed: false, at: Int32Array.of(-1, 1, 0, 3, -1, 2) })
    expect(cellBox(Uint32Array.of(0, 9), 10, null)).toMatchObject({ left: 0, columns: 10, closed: false })
    expect(cellBox(Uint32Array.from({ length: 10 }, (_, i) => i), 10, 10)).toMatchObject({ left: 0, columns: 10, closed: true })
  })

  it('a grid goes round where its edges span a full circle; a repeated column does not count', () => {
    const axes = (columns: number, from: number, step: number) => columnsRound({ kind: 'axes', rows: 1, columns, latEdges: Float64Array.of(0, 1), lonEdges: Float64Array.from({ length: columns + 1 }, (_, i) => from + i * step) })
    expect([axes(36, -180, 10), axes(37, 0, 10), axes(36, 180, -10), axes(35, -180, 10), axes(12, -12, 0.1)]).toEqual([36, 36, 36, null, null])
  })

  it('the outline of a patch round the globe is one line along its north and one along its south', () => {
    const found = patchesOf(grid`1 1 1 1 / 5 5 5 5 / 1 1 1 1`, 5, { round: 4 })
    expect(patchOutlines(found.labels, 1, found.box)).toEqual([[[[1, 0], [1, 4]], [[2, 1], [2, -3]]]])
  })
})
