import { describe, expect, it } from 'vitest'
import { cellsWith, flagsSet } from '../../../server/grids/flags'
import { cfSource } from '../../../server/grids/read/cf-source'
import { filledMeanings, flagMeanings } from '../../../server/grids/read/cf-flags'
import type { NumberType } from '../../../server/grids/read/raw-netcdf'
import { rawFile, rawVariable } from './raw-file'

const whole = { row: 0, column: 0, rows: 2, columns: 2 }

/** Two latitudes, two longitudes, chlorophyll and whatever flag variables a test brings. */
function sourceWith(
  flags: { name: string; type: NumberType; attributes: Record<string, string | number | number[]>; cells: number[]; turned?: boolean }[],
  chlorophyll: Record<string, string> = {},
  global: Record<string, string> = {},
) {
  const axes: [string, number][] = [['lat', 2], ['lon', 2]]
  return cfSource(
    rawFile(
      [
        rawVariable('lat', [['lat', 2]], { units: 'degrees_north' }),
        rawVariable('lon', [['lon', 2]], { units: 'degrees_east' }),
        rawVariable('chlor_a', axes, { units: 'mg m-3', ...chlorophyll }),
        ...flags.map(({ name, type, attributes, turned }) =>
          rawVariable(name, turned ? axes.toReversed() : axes, attributes, type),
        ),
      ],
      {
        lat: [50, 51], lon: [4, 5], chlor_a: [1, 2, 3, 4],
        ...Object.fromEntries(flags.map(({ name, cells }) => [name, cells])),
      },
      global,
    ),
    'flags.nc',
  )
}

const bits = { flag_masks: [1, 2, -2147483648], flag_meanings: 'LAND CLOUD BRIGHT' }

describe('flags of a variable', () => {
  it('are those that its ancillary_variables name', async () => {
    const source = sourceWith(
      [
        { name: 'other_flags', type: 'i4', attributes: bits, cells: [0, 0, 0, 0] },
        { name: 'l2_flags', type: 'i4', attributes: bits, cells: [1, 2, -2147483648, -2147483647] },
      ],
      { ancillary_variables: 'chlor_a_error l2_flags' },
    )
    const { flags } = source.variables.find(({ name }) => name === 'chlor_a')!
    expect(flags).toEqual({
      variable: 'l2_flags',
      meanings: [{ name: 'LAND', mask: 1 }, { name: 'CLOUD', mask: 2 }, { name: 'BRIGHT', mask: 2147483648 }],
    })
    const cells = await source.readFlags('chlor_a', 0, whole)
    expect(flags!.meanings.map((meaning) => Array.from(cellsWith(cells, meaning)))).toEqual([[1, 0, 0, 1], [0, 1, 0, 0], [0, 0, 1, 1]])
    // The default fill of the type is bits 31 and 0: flags like any other unless the file declares them as missing.
    expect(cells.missing).toBeNull()
  })

  it('are the only flag variable on the same grid when none is named, in whatever order its dimensions are', async () => {
    const source = sourceWith([{ name: 'qc', type: 'u1', attributes: { flag_values: [0, 1, 2], flag_meanings: 'good bad cloud' }, cells: [0, 1, 2, 0], turned: true }])
    const cells = await source.readFlags('chlor_a', 0, whole)
    expect(Array.from(cells.raw)).toEqual([0, 2, 1, 0])
  })

  it('are none when two variables could be meant', async () => {
    const one = { type: 'u1' as const, attributes: { flag_values: [0, 1], flag_meanings: 'a b' }, cells: [0, 0, 0, 0] }
    const source = sourceWith([{ name: 'a', ...one }, { name: 'b', ...one }])
    expect(source.variables[0]!.flags).toBeUndefined()
    await expect(source.readFlags('chlor_a', 0, whole)).rejects.toThrow(RangeError)
  })

  it('hold 64 bits', async () => {
    const source = sourceWith([
      { name: 'WQSF', type: 'u8', attributes: { flag_masks: [1, 2 ** 40], flag_meanings: 'INVALID HISOLZEN' }, cells: [2 ** 40 + 1, 1, 2 ** 40, 0] },
    ])
    const cells = await source.readFlags('chlor_a', 0, whole)
    const { meanings } = source.variables[0]!.flags!
    expect(meanings.map((meaning) => Array.from(cellsWith(cells, meaning)))).toEqual([[1, 1, 0, 0], [1, 0, 1, 0]])
    expect(flagsSet(1, meanings, 256)).toEqual(['INVALID', 'HISOLZEN'])
  })

  it('are not used, with a word about it, when their lists do not fit together', () => {
    const source = sourceWith([{ name: 'qc', type: 'u1', attributes: { flag_values: [0, 1], flag_meanings: 'good bad cloud' }, cells: [0, 0, 0, 0] }])
    expect(source.variables[0]!.flags).toBeUndefined()
    expect(source.warnings).toContain('The flags of qc are not used: 3 meanings, 0 masks and 2 values do not fit together.')
  })

  it('may have their lists as text', () => {
    const variable = rawVariable('qc', [['x', 1]], { flag_masks: '1b, 2b, -128b', flag_meanings: 'a b c' }, 'i1')
    expect(flagMeanings(variable).meanings).toEqual([{ name: 'a', mask: 1 }, { name: 'b', mask: 2 }, { name: 'c', mask: 128 }])
  })
})

describe('cells that were filled in', () => {
  it('are those whose flags say so', () => {
    const source = sourceWith([{ name: 'flags', type: 'u1', attributes: { flag_masks: [1, 2], flag_meanings: 'LAND GAP_FILLED' }, cells: [0, 0, 0, 0] }])
    expect(source.variables[0]!.gapFilled).toEqual({ variable: 'flags', meanings: [{ name: 'GAP_FILLED', mask: 2 }] })
  })

  it('are known to exist, but not where, when only the title says so', () => {
    expect(sourceWith([], {}, { title: 'Daily cloud-free chlorophyll' }).variables[0]!.gapFilled).toEqual({ variable: null, meanings: [] })
    expect(sourceWith([], {}, { title: 'Daily chlorophyll' }).variables[0]!.gapFilled).toBeUndefined()
  })

  it('are told from their opposite', () => {
    const named = (name: string) => filledMeanings([{ name }]).length
    expect(['interpolated', 'gap_filled', 'GAPFILL', 'reconstructed', 'filled'].map(named)).toEqual([1, 1, 1, 1, 1])
    expect(['not_interpolated', 'observed', 'non_filled', 'fill_value', 'no_gap_fill'].map(named)).toEqual([0, 0, 0, 0, 0])
  })
})
