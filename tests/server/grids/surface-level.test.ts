import { describe, expect, it } from 'vitest'
import { cfSource } from '../../../server/grids/read/cf-source'
import { LayerRefused } from '../../../server/grids/layer-refused'
import { rawFile, rawVariable } from './raw-file'

type Notes = Record<string, string>

/** Chlorophyll on 2 x 2 cells with one level, and the same without. */
function fileAt(level: number, notes: Notes, { name = 'depth', scalar = false, beside = false } = {}) {
  const onLevel: [string, number][] = scalar ? [] : [[name, 1]]
  const chl = { units: 'mg m-3', ...(scalar ? { coordinates: name } : {}) }
  return rawFile(
    [
      rawVariable('lat', [['lat', 2]], { units: 'degrees_north' }),
      rawVariable('lon', [['lon', 2]], { units: 'degrees_east' }),
      rawVariable(name, onLevel, notes),
      rawVariable('chl', [...onLevel, ['lat', 2], ['lon', 2]], chl),
      ...(beside ? [rawVariable('chlor_a', [['lat', 2], ['lon', 2]], { units: 'mg m-3' })] : []),
    ],
    { lat: [50, 51], lon: [-12, -11], [name]: [level], chl: [1, 2, 3, 4], chlor_a: [1, 2, 3, 4] },
  )
}

function refusalOf(file: ReturnType<typeof rawFile>): LayerRefused {
  try {
    cfSource(file, 'chl.nc')
  } catch (error) {
    if (error instanceof LayerRefused) return error
    throw error
  }
  return expect.fail('it was not refused')
}

describe('a lone level', () => {
  it.each([
    [50, { units: 'm', positive: 'down' }, '50 m'], [-50, { units: 'm', positive: 'up' }, '-50 m'], [10.5, { units: 'metres' }, '10.5 metres'],
    [0.2, { units: 'km' }, '0.2 km'], [1500, { units: 'cm' }, '1500 cm'], [30, { units: 'dbar' }, '30 dbar'], [75, {}, '75 m'],
  ] as [number, Notes, string][])('at %d of %j is not the surface: the file is refused and says so', (level, notes, words) => {
    const { code, message } = refusalOf(fileAt(level, notes))
    expect(code).toBe('not-surface')
    expect(message).toBe(`The file holds nothing of the sea’s surface: its only level is ${words}, and Offing reads the surface, down to 10 m.`)
  })

  it.each([[0, 'm'], [0.494, 'm'], [10, 'm'], [-10, 'm'], [1000, 'cm'], [40, 'level'], [1, '1']] as const)('at %d %s is read', (level, units) => {
    expect(cfSource(fileAt(level, { units }), 'chl.nc').variables.map(({ name }) => name)).toEqual(['chl'])
  })

  it('says where it lies when that is near the surface and not at it', () => {
    expect(cfSource(fileAt(0.494, { units: 'm' }), 'chl.nc').warnings).toEqual(['chl is not at the surface: its only level is 0.494 m.'])
  })

  it('counts too where it is named beside the variable, without a dimension; a height of the instrument does not', () => {
    expect(refusalOf(fileAt(50, { units: 'm', standard_name: 'depth' }, { scalar: true })).message).toContain('its only level is 50 m')
    expect(cfSource(fileAt(800, { units: 'km' }, { scalar: true, name: 'altitude' }), 'chl.nc').variables).toHaveLength(1)
  })

  it('at depth is left out beside a variable at the surface, with the reason', () => {
    const { variables, warnings } = cfSource(fileAt(50, { units: 'm' }, { beside: true }), 'chl.nc')
    expect(variables.map(({ name }) => name)).toEqual(['chlor_a'])
    expect(warnings).toEqual(['chl was left out: its only level is 50 m, and Offing reads the surface, down to 10 m.'])
  })
})
