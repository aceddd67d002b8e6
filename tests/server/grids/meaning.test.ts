import { describe, expect, it } from 'vitest'
import { packingOf, unpackInPlace } from '../../../server/grids/read/cf-packing'
import { meaningOf } from '../../../server/grids/read/quantity'
import { insideLog10, isPerSteradian, milligramsPerCubicMetre } from '../../../server/grids/read/units'
import { rawVariable } from './raw-file'

const standard = 'mass_concentration_of_chlorophyll_a_in_sea_water'
const named = (name: string, fileUnit: string | null, longName: string | null = null, standardName: string | null = null) =>
  meaningOf({ name, longName, standardName, fileUnit, wavelengthAttribute: null })

describe('units of mass in a volume', () => {
  it.each([
    ['mg m-3', 1], ['mg/m3', 1], ['mg m^-3', 1], ['mg.m-3', 1], ['mg m**-3', 1], ['mg/m^3', 1], ['mg/m**3', 1],
    ['mg m⁻³', 1], ['mg/m³', 1], ['milligram m-3', 1], ['mg chl m-3', 1], ['mg Chl-a m^-3', 1], ['milligrams per cubic meter', 1],
    ['ug L-1', 1], ['µg/L', 1], ['μg l-1', 1], ['ug/l', 1], ['microgram/liter', 1], ['micrograms litre-1', 1], ['ug dm-3', 1],
    ['kg m-3', 1e6], ['g m-3', 1e3], ['mg L-1', 1e3], ['ug m-3', 1e-3], ['ng/ml', 1],
  ])('%s is %s mg m-3', (unit, factor) => expect(milligramsPerCubicMetre(unit)).toBeCloseTo(factor, 12))

  it.each(['mg m-2', 'mg', 'm-3', '1', '', 'mg m3', 'mg L', 'mg/m-3', 'mg m-3 d-1', 'umol kg-1', 'degrees', '%'])(
    '"%s" is none',
    (unit) => expect(milligramsPerCubicMetre(unit)).toBeNull(),
  )

  it('knows sr-1 in its spellings', () => {
    for (const unit of ['sr-1', 'sr^-1', '1/sr', 'sr**-1', 'sr⁻¹', 'steradian-1', 'per steradian']) {
      expect(isPerSteradian(unit)).toBe(true)
    }
    for (const unit of ['sr', '1', 'W m-2 sr-1']) expect(isPerSteradian(unit)).toBe(false)
  })

  it('finds the unit inside a logarithm', () => {
    expect(insideLog10('log10(mg m-3)')).toBe('mg m-3')
    expect(insideLog10('lg(re 1 mg m-3)')).toBe('mg m-3')
    expect(insideLog10('log10 mg/m^3')).toBe('mg/m^3')
    expect(insideLog10('mg m-3')).toBeNull()
  })
})

describe('what a variable measures', () => {
  it.each([
    ['chlor_a', 'mg m^-3', 'Chlorophyll Concentration, OCI Algorithm', null],
    ['CHL', 'milligram m-3', 'Chlorophyll a concentration', standard],
    ['chl', 'mg m-3', null, null], ['CHL1_mean', 'mg/m3', null, null], ['chlorophyll', 'ug L-1', null, null],
    ['pigment', 'kg m-3', null, standard],
    ['chlor_a', 'mg m-3', 'Chlorophyll-a concentration in seawater (not log-transformed)', null],
  ])('is chlorophyll for %s in %s', (name, unit, longName, standardName) => {
    expect(named(name, unit, longName, standardName)).toMatchObject({ quantity: 'chlorophyll', unit: 'mg m-3' })
  })

  it.each([
    ['CHL_error', 'mg m-3', null, null], ['CHL_uncertainty', '%', 'Chlorophyll uncertainty', standard],
    ['chlor_a_log10_bias', 'log10(mg m-3)', 'Bias of log10 chlorophyll', null],
    ['chlor_a_log10_rmsd', 'log10(mg m-3)', null, null], ['CHL_count', '1', null, null], ['chl_flags', null, null, null],
    ['CHL1_flags', 'mg m-3', null, null], ['chl', 'mg m-3', 'Number of observations of chlorophyll', standard],
    ['chlor_a', 'mg m-3', 'Standard deviation of chlorophyll', null],
    ['x', 'mg m-3', null, `${standard} standard_error`], ['chlAnomaly', 'mg m-3', null, null],
    ['MICRO', 'mg m-3', null, 'mass_concentration_of_microphytoplankton_expressed_as_chlorophyll_in_sea_water'],
    ['sst', 'degree_C', null, null],
  ])('is never chlorophyll for %s in %s', (name, unit, longName, standardName) => {
    expect(named(name, unit, longName, standardName).quantity).toBe('other')
  })

  it('says why a variable named like chlorophyll is not taken when its unit does not fit', () => {
    expect(named('chlor_a', null).warning).toBe('chlor_a looks like chlorophyll, but the file gives it no unit.')
    expect(named('chlor_a', 'mmol m-3').warning).toContain('"mmol m-3" is none Offing can convert')
    expect(named('log10_chl', 'mg m-3').warning).toContain('named like a base-10 logarithm')
  })

  it('is chlorophyll stored as a logarithm when the unit says so', () => {
    expect(named('log10_chl', 'log10(ug L-1)')).toMatchObject({ quantity: 'chlorophyll', log10: true })
  })

  it.each([
    ['log10_chl', '1', null], ['log10_chl', null, null], ['chl_log10', 'dimensionless', null], ['lg_chl', null, null], ['LOG10-CHL', 'log10', null],
    ['chlor_a_lg', '', null], ['chl', '1', 'log10 of chlorophyll'], ['science/log10_chlor_a', '1', null],
  ])('is chlorophyll stored as a logarithm where only the name says so: %s in %s', (name, unit, longName) => {
    const meaning = named(name, unit, longName)
    expect(meaning).toMatchObject({ quantity: 'chlorophyll', unit: 'mg m-3', log10: true, factor: 1, note: 'stored as base-10 logarithm, of mg m-3' })
    expect(meaning.warning).toContain('named like a base-10 logarithm and is read as one')
  })

  it('is no logarithm by name alone for what tells of chlorophyll, nor for a name that only ends alike', () => {
    for (const name of ['log10_chl_bias', 'chl_log10_std', 'lg_chl_count']) expect(named(name, '1').quantity).toBe('other')
    expect(named('chl_alg', '1').log10).toBe(false)
    expect(named('chl', '1').warning).toContain('"1" is none Offing can convert')
  })

  it('is reflectance with its wavelength', () => {
    expect(named('Rrs_443', 'sr^-1')).toMatchObject({ quantity: 'reflectance', wavelengthNm: 443, unit: 'sr-1' })
    expect(named('RRS412_5', 'sr-1').wavelengthNm).toBe(412.5)
    expect(named('Rrs_443_unc', 'sr^-1').quantity).toBe('other')
    expect(named('Rrs_443', 'W m-2').quantity).toBe('other')
  })
})

describe('packed values', () => {
  const unpack = (attributes: Record<string, number | number[] | string>, stored: number[], type: 'i2' | 'i1' | 'f4' = 'i2') => {
    const variable = rawVariable('v', [], {}, type)
    const typed = new Map(
      Object.entries(attributes).map(([name, value]) => [
        name,
        { value, type: typeof value === 'string' ? ('text' as const) : /scale|offset/.test(name) ? ('f8' as const) : type },
      ]),
    )
    const values = Float64Array.from(stored)
    unpackInPlace(values, packingOf({ ...variable, attributes: typed }))
    return Array.from(values, (value) => Number(value.toPrecision(12)))
  }
  const rrs = { scale_factor: 2e-6, add_offset: 0.05, _FillValue: -32767, valid_range: [-30000, 25000] }

  it('unpack like reflectance usually does', () => {
    const wanted = [-0.01, 0, 0.008, 0.1]
    unpack(rrs, [-30000, -25000, -21000, 25000]).forEach((value, i) => expect(value).toBeCloseTo(wanted[i]!, 15))
  })

  it('are tested against the valid range before they are unpacked', () => {
    expect(unpack(rrs, [-30001, 25001, -32767])).toEqual([NaN, NaN, NaN])
  })

  it('know the default fill of their type, except bytes, which have none', () => {
    expect(unpack({}, [-32767, 1])).toEqual([NaN, 1])
    expect(unpack({}, [-127, -1], 'i1')).toEqual([-127, -1])
    expect(unpack({}, [9.969209968386869e36, 2], 'f4')).toEqual([NaN, 2])
  })

  it('take a fill value written as text, and several missing values', () => {
    expect(unpack({ missing_value: '-5' }, [-5, 1])).toEqual([NaN, 1])
    expect(unpack({ missing_value: [-5, -6] }, [-5, -6, 1])).toEqual([NaN, NaN, 1])
  })

  it('compare a fill value in the precision of the data', () => {
    expect(unpack({ _FillValue: -999.9 }, [Math.fround(-999.9), 3], 'f4')).toEqual([NaN, 3])
  })

  it('are unsigned where the file marks them so', () => {
    expect(unpack({ _Unsigned: 'true', _FillValue: -1, scale_factor: 0.5 }, [-1, -2, 4], 'i1')).toEqual([NaN, 127, 2])
  })

  it('never let infinity through', () => expect(unpack({}, [Infinity, -Infinity, 1], 'f4')).toEqual([NaN, NaN, 1]))
})
