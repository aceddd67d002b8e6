import { describe, expect, it } from 'vitest'
import { keptAndMasked } from '../../../shared/science/kept-and-masked'

const none = { value: 0, missing: 0, outside: 0 }

/** 100 cells: 40 plain, 20 cloud (15 of them missing), 10 cloud and glint, 5 glint, 5 filled in, 20 missing or out of range. */
const found = {
  reasons: ['GLINT', 'CLOUD', 'filled in, not seen'],
  groups: [
    { carry: [], value: 40, missing: 18, outside: 2 },
    { carry: [1], value: 5, missing: 15, outside: 0 },
    { carry: [0, 1], value: 10, missing: 0, outside: 0 },
    { carry: [0], value: 5, missing: 0, outside: 0 },
    { carry: [2], value: 5, missing: 0, outside: 0 },
  ],
  unlisted: none,
}

describe('what would be kept', () => {
  it('loses the cells of every chosen flag once, and counts each reason for all its cells', () => {
    expect(keptAndMasked(found, ['CLOUD', 'GLINT'])).toEqual({
      cells: 100,
      kept: 40,
      parts: [
        { reason: 'CLOUD', cells: 30, first: 30 },
        { reason: 'GLINT', cells: 15, first: 5 },
        { reason: 'filled in, not seen', cells: 5, first: 5 },
        { reason: 'outside the valid range', cells: 2, first: 2 },
        { reason: 'missing in the file', cells: 18, first: 18 },
      ],
      unlisted: 0,
    })
  })

  it('has the bar of kept and first reasons add up to all cells, whatever is chosen', () => {
    for (const chosen of [[], ['CLOUD'], ['GLINT'], ['CLOUD', 'GLINT'], ['NOT_THERE']]) {
      const { cells, kept, parts, unlisted } = keptAndMasked(found, chosen)
      expect(parts.reduce((sum, part) => sum + part.first, kept + unlisted)).toBe(cells)
    }
  })

  it('takes filled cells for not seen though nobody chose so, and a missing cell for missing where no chosen flag explains it', () => {
    const { kept, parts } = keptAndMasked(found, [])
    expect(kept).toBe(60)
    expect(parts.map(({ reason, cells }) => [reason, cells])).toEqual([['filled in, not seen', 5], ['outside the valid range', 2], ['missing in the file', 33]])
  })

  it('leaves rare mixtures open only while a flag hides cells', () => {
    const rare = { reasons: ['CLOUD'], groups: [{ carry: [0], value: 10, missing: 0, outside: 0 }], unlisted: { value: 6, missing: 4, outside: 0 } }
    expect(keptAndMasked(rare, [])).toMatchObject({ cells: 20, kept: 16, unlisted: 0, parts: [{ reason: 'missing in the file', cells: 4 }] })
    expect(keptAndMasked(rare, ['CLOUD'])).toMatchObject({ cells: 20, kept: 0, unlisted: 10, parts: [{ reason: 'CLOUD', cells: 10 }] })
  })

  it('of no cells is nothing', () => {
    expect(keptAndMasked({ reasons: [], groups: [], unlisted: none }, ['CLOUD'])).toEqual({ cells: 0, kept: 0, parts: [], unlisted: 0 })
  })
})
