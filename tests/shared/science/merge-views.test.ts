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
