import { describe, expect, it } from 'vitest'
import { compareVersions, mergeLayers } from '../../../shared/science/merge-views'
import { grid } from './small-grid'

const layer = ({ values }: { values: Float64Array }, processingVersion = '1') => ({ values, processingVersion })

describe('layers of one view', () => {
  it('cells seen once keep their value, cells never seen stay missing', () => {
    const merged = mergeLayers([layer(grid`1 · · / 4 · 3`), layer(grid`· 2 · / · 8 ·`)], 'log10')
    expect(merged).toEqual(grid`1 2 · / 4 8 3`.values)
  })

  it('cells seen twice take the mean of log10, or the mean', () => {
    const layers = [layer(grid`1 2`), layer(grid`100 4`)]
    expect(mergeLayers(layers, 'linear')).toEqual(Float64Array.of(50.5, 3))
    const [first, second] = mergeLayers(layers, 'log10')
    expect(first).toBeCloseTo(10, 12)
    expect(second).toBeCloseTo(Math.sqrt(8), 12)
  })

  it('a later processing version wins cell by cell, in any order of arrival', () => {
    const layers = [layer(grid`1 1 ·`, 'v9'), layer(grid`7 · ·`, 'v10')]
    expect(mergeLayers(layers, 'log10')).toEqual(grid`7 1 ·`.values)
    expect(mergeLayers([...layers].reverse(), 'log10')).toEqual(grid`7 1 ·`.values)
  })

  it('values at or below 0 take no part in log10 unless nothing else was seen', () => {
    const layers = [layer(grid`5 -1`), layer(grid`-2 -3`)]
    expect(mergeLayers(layers, 'log10')).toEqual(Float64Array.of(5, -2))
    expect(mergeLayers(layers, 'linear')).toEqual(Float64Array.of(1.5, -2))
  })

  const made = (producedAt: number | null, values: ReturnType<typeof grid>, endsAt: number | null = null) => ({ ...layer(values), observedAt: 7, endsAt, producedAt })

  it('of one instant and version the later made wins the cell, and the earlier serves what it lacks, in any order', () => {
    const layers = [made(1, grid`1 1 1 ·`), made(3, grid`9 · · ·`), made(2, grid`4 4 · ·`)]
    for (const order of [[0, 1, 2], [0, 2, 1], [1, 0, 2], [1, 2, 0], [2, 0, 1], [2, 1, 0]]) {
      expect(mergeLayers(order.map((i) => layers[i]!), 'log10')).toEqual(grid`9 4 1 ·`.values)
    }
  })

  it('takes the mean as before where a layer does not say when it was made, or both say the same', () => {
    expect(mergeLayers([made(1, grid`1`), made(null, grid`3`)], 'linear')).toEqual(Float64Array.of(2))
    expect(mergeLayers([made(5, grid`1`), made(5, grid`3`)], 'linear')).toEqual(Float64Array.of(2))
    // The corrected one is out; the one nobody knows the age of stays.
    expect(mergeLayers([made(1, grid`100`), made(null, grid`3`), made(2, grid`1`)], 'linear')).toEqual(Float64Array.of(2))
  })

  it('of two instants, or of periods that end differently, neither corrects the other', () => {
    expect(mergeLayers([made(1, grid`1`), { ...made(2, grid`3`), observedAt: 8 }], 'linear')).toEqual(Float64Array.of(2))
    expect(mergeLayers([made(1, grid`1`, 9), made(2, grid`3`, 10)], 'linear')).toEqual(Float64Array.of(2))
  })

  it('a later version counts before a later making', () => {
    const layers = [{ ...made(9, grid`1 5`), processingVersion: '1' }, { ...made(2, grid`7 ·`), processingVersion: '2' }]
    expect(mergeLayers(layers, 'log10')).toEqual(grid`7 5`.values)
  })

  it('no layer, or layers of different grids, are refused', () => {
    expect(() => mergeLayers([], 'log10')).toThrow(RangeError)
    expect(() => mergeLayers([layer(grid`1 2`), layer(grid`1`)], 'log10')).toThrow(RangeError)
  })
})

describe('processing versions', () => {
  it('numbers inside them count as numbers', () => {
    const sorted = ['R2022.10', 'R2018.0', 'R2022.9', 'R2022'].sort(compareVersions)
    expect(sorted).toEqual(['R2018.0', 'R2022', 'R2022.9', 'R2022.10'])
    expect(compareVersions('6.0', '6.0')).toBe(0)
  })
})
