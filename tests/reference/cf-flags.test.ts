import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { cellsWith, flagsSet } from '../../server/grids/flags'
import { flagBlock, flagMeanings } from '../../server/grids/read/cf-flags'
import { rawFile, rawVariable } from '../server/grids/raw-file'

interface Example {
  masks: number[]
  values?: number[]
  meanings?: string[]
  check: { v: number; true?: string[]; true_bits?: number[] }[]
}

const examples = JSON.parse(readFileSync(new URL('./values/cf-conventions.json', import.meta.url).pathname, 'utf8')) as Record<
  'flags_3_6' | 'flags_3_8',
  Example
>

describe('flags as the CF conventions print them', () => {
  const { masks, values, meanings, check } = examples.flags_3_8
  const variable = rawVariable(
    'current_speed_qc', [['t', 1]], { flag_masks: masks, flag_values: values!, flag_meanings: meanings!.join(' ') }, 'i1',
  )

  it.each(check)('example 3.8: $v means $true', ({ v, true: wanted }) => {
    expect(flagsSet(v, flagMeanings(variable).meanings!)).toEqual(wanted)
  })

  it.each(examples.flags_3_6.check)('example 3.6: $v has the bits $true_bits', ({ v, true_bits: bits }) => {
    const named = examples.flags_3_6.masks.map((mask) => ({ name: String(mask), mask }))
    expect(flagsSet(v, named)).toEqual(bits!.map(String))
  })

  it('mark the cells of a block, and none where the flags are missing', () => {
    const file = rawFile([variable], { current_speed_qc: [13, 6, 8, 0] })
    const cells = flagBlock(file, { ...variable, attributes: new Map([...variable.attributes, ['_FillValue', { value: 6, type: 'i1' }]]) }, [0], [4])
    const [low, hardware] = flagMeanings(variable).meanings!
    expect(Array.from(cellsWith(cells, low!))).toEqual([1, 0, 0, 0])
    expect(Array.from(cellsWith(cells, hardware!))).toEqual([0, 0, 0, 0])
    expect(Array.from(cells.missing!)).toEqual([0, 1, 0, 0])
  })
})
