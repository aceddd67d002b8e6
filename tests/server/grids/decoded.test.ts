import { readFileSync, writeFileSync } from 'node:fs'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { openPack, writePack } from '../../../server/grids/decoded/pack-file'
import { packTile, tileBox, tileCount, unpackTile, type TileCells } from '../../../server/grids/decoded/tile-pack'
import { tileRectangles } from '../../../server/grids/decoded/tile-rectangles'

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-decoded-'))
})
afterAll(() => rm(folder, { recursive: true }))

const anyNumber = fc.oneof(fc.double(), fc.float(), fc.constantFrom(NaN, 0, -0, Infinity, -Infinity, 1e-40))
const bits = (values: Float64Array) => Array.from(values, (value) => (Number.isNaN(value) ? 'missing' : Object.is(value, -0) ? '-0' : value))

describe('a decoded tile', () => {
  it('keeps every value to its last bit, what is missing, and why', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(anyNumber, fc.nat({ max: 0xffffffff })), { minLength: 1, maxLength: 200 }), fc.boolean(), (cells, hidden) => {
        const tile: TileCells = { values: Float64Array.from(cells, ([value]) => value), reasons: hidden ? Uint32Array.from(cells, ([, reason]) => reason) : null }
        const { flags, bytes } = packTile(tile)
        const back = unpackTile(flags, bytes, cells.length)
        expect(bits(back.values)).toEqual(bits(tile.values))
        expect(back.reasons && [...back.reasons]).toEqual(tile.reasons && [...tile.reasons])
      }),
    )
  })

  it('in which nothing was seen takes no room', () => {
    expect(packTile({ values: new Float64Array(4096).fill(NaN), reasons: null }).bytes).toHaveLength(0)
  })
})

describe('a pack', () => {
  const shape = { rows: 130, columns: 70 }
  const header = { ...shape, reasons: ['cloud'] }
  const cells = (tile: number): TileCells => {
    const { rows, columns } = tileBox(shape, tile)
    return { values: Float64Array.from({ length: rows * columns }, (_, i) => tile + i / 4096), reasons: null }
  }
  const write = (name: string) => {
    const path = join(folder, name)
    writePack(path, header, new Map([0, 1, 4, 5].map((tile) => [tile, packTile(cells(tile))])))
    return path
  }

  it('answers each tile alone, cut off at the edge of the grid, and knows which it has not', () => {
    expect(tileCount(shape)).toBe(6)
    expect(tileBox(shape, 5)).toEqual({ row: 128, column: 64, rows: 2, columns: 6 })
    const pack = openPack(write('whole'), shape)!
    for (const tile of [0, 1, 4, 5]) expect(pack.cells(tile).values).toEqual(cells(tile).values)
    expect([2, 3].map((tile) => pack.has(tile))).toEqual([false, false])
    expect(pack.header).toEqual(header)
    pack.close()
  })

  it('of another grid, cut short, or with another byte anywhere, is not taken for good', () => {
    const path = write('hurt')
    const good = readFileSync(path)
    expect(openPack(path, { rows: 130, columns: 71 })).toBeNull()
    expect(openPack(join(folder, 'none'), shape)).toBeNull()
    fc.assert(
      fc.property(fc.nat({ max: good.length - 1 }), fc.integer({ min: 1, max: 255 }), (at, change) => {
        const bad = Buffer.from(good)
        bad[at]! ^= change
        writeFileSync(path, bad)
        expect(() => {
          const pack = openPack(path, shape)
          if (!pack) throw new Error('no pack')
          try {
            for (const tile of [0, 1, 4, 5]) {
              // Bytes that inflate to the same values hurt nobody: deflate has spare bits.
              if (bits(pack.cells(tile).values).join() !== bits(cells(tile).values).join()) throw new WrongNumber()
            }
          } finally {
            pack.close()
          }
          throw new Error('unharmed')
        }).toThrow(expect.not.objectContaining({ name: 'WrongNumber' }))
      }),
    )
    for (const length of [0, 5, 40, good.length - 1]) {
      writeFileSync(path, good.subarray(0, length))
      expect(() => {
        const pack = openPack(path, shape)
        if (!pack) throw new Error('no pack')
        try {
          for (const tile of [0, 1, 4, 5]) pack.cells(tile)
        } finally {
          pack.close()
        }
      }).toThrow()
    }
  })

  class WrongNumber extends Error {
    override name = 'WrongNumber'
  }
})

describe('tiles to be read from an original', () => {
  it('are few rectangles that hold each of them once, and little else', () => {
    const shape = { rows: 640, columns: 640 }
    fc.assert(
      fc.property(fc.uniqueArray(fc.nat({ max: 99 }), { minLength: 1 }), (tiles) => {
        const rectangles = tileRectangles(shape, tiles)
        expect(rectangles.flatMap((one) => one.tiles).sort((a, b) => a - b)).toEqual([...tiles].sort((a, b) => a - b))
        for (const { window, tiles: inside } of rectangles) {
          for (const tile of inside) {
            const box = tileBox(shape, tile)
            expect(box.row >= window.row && box.row + box.rows <= window.row + window.rows).toBe(true)
            expect(box.column >= window.column && box.column + box.columns <= window.column + window.columns).toBe(true)
          }
        }
      }),
    )
    expect(tileRectangles(shape, [0, 1, 10, 11])).toEqual([{ window: { row: 0, column: 0, rows: 128, columns: 128 }, tiles: [0, 1, 10, 11] }])
    expect(tileRectangles(shape, [0, 99])).toHaveLength(2)
  })
})
