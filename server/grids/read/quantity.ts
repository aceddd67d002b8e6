import type { GridVariable } from '../grid-source'
import { insideLog10, isBare, isPerSteradian, milligramsPerCubicMetre } from './units'

export interface Named {
  name: string
  longName: string | null
  standardName: string | null
  fileUnit: string | null
  wavelengthAttribute: number | null
}

/** What a variable measures and how its unpacked numbers become the unit Offing works in. */
export interface Meaning extends Pick<GridVariable, 'quantity' | 'wavelengthNm' | 'unit'> {
  log10: boolean
  factor: number
  note: string | null
  warning: string | null
}

const chlorophyllStandardName =
  /^(mass_)?concentration_of_chlorophyll(_a)?_in_sea_water$|^chlorophyll_concentration_in_sea_water$/
const chlorophyllName =
  /^(log_?10_?|lg_?)?(chl|chla|chl_a|chlor_a|chlora|chlorophyll|chlorophyll_?a|chl[12])(_(mean|avg|average|median|gm|oc\w*|oci|nn|conc|concentration|surface|log_?10|lg))*$/
const reflectanceStandardName =
  'surface_ratio_of_upwelling_radiance_emerging_from_sea_water_to_downwelling_radiative_flux_in_air'

/** Words that make a variable a statement about another one: its error, count, flags, a difference. */
const secondary = new Set([
  'error', 'errors', 'err', 'uncertainty', 'uncertainties', 'unc', 'bias', 'rmsd', 'rmse', 'rms', 'deviation', 'std',
  'stdev', 'stddev', 'sd', 'sigma', 'variance', 'var', 'count', 'counts', 'number', 'nobs', 'observations', 'num', 'flag',
  'flags', 'quality', 'qc', 'qa', 'mask', 'anomaly', 'anom', 'anomalies', 'difference', 'diff', 'ratio', 'trend', 'gradient',
  'confidence', 'status', 'weight', 'weights', 'climatology', 'clim', 'percentile', 'index', 'interpolated', 'min', 'max',
])
/** Of these, the ones that may as well belong to a quantity of its own: an index, a ratio, a greatest value. */
const ownQuantities = new Set([
  'anomaly', 'anom', 'anomalies', 'difference', 'diff', 'ratio', 'trend', 'gradient', 'climatology', 'clim', 'percentile', 'index',
  'interpolated', 'min', 'max',
])

/** Works out chlorophyll and reflectance; anything else stays 'other' in the file's own unit. */
export function meaningOf(variable: Named): Meaning {
  const other: Meaning = {
    quantity: 'other', wavelengthNm: null, unit: variable.fileUnit, log10: false, factor: 1, note: null, warning: null,
  }
  if (isSecondary(variable)) return other
  if (isChlorophyll(variable)) return chlorophyll(variable, other)
  const wavelengthNm = reflectanceWavelength(variable)
  if (wavelengthNm === null) return other
  if (variable.fileUnit === null || !isPerSteradian(variable.fileUnit)) {
    return { ...other, warning: notConvertible(variable, 'reflectance') }
  }
  return { ...other, quantity: 'reflectance', wavelengthNm, unit: 'sr-1' }
}

type Names = Pick<Named, 'name' | 'longName' | 'standardName'>

function isSecondary(named: Names): boolean {
  return hasModifier(named) || wordsOf(named).some((word) => secondary.has(word))
}

/** True for the error, bias, uncertainty, count or flags of another variable, whatever that one measures. */
export function tellsOfAnother({ attributes, ...named }: Names & { attributes: Readonly<Record<string, unknown>> }): boolean {
  return 'flag_meanings' in attributes || hasModifier(named) || wordsOf(named).some((word) => secondary.has(word) && !ownQuantities.has(word))
}

/** A standard name may carry a modifier behind a blank, such as "standard_error" or "status_flag". */
const hasModifier = ({ standardName }: Names): boolean => standardName?.trim().includes(' ') ?? false

function wordsOf({ name, longName }: Names): string[] {
  return [baseName(name), longName ?? ''].flatMap((text) =>
    text.replace(/([a-z])([A-Z])/g, '$1 $2').toLowerCase().split(/[^a-z]+/),
  )
}

function isChlorophyll({ name, standardName }: Named): boolean {
  if (standardName !== null && chlorophyllStandardName.test(standardName)) return true
  return chlorophyllName.test(baseName(name).toLowerCase().replaceAll('-', '_'))
}

function chlorophyll(variable: Named, other: Meaning): Meaning {
  const { fileUnit, name, longName } = variable
  const saysLog10 = /log_?10|^lg_?|_lg(_|$)/i.test(baseName(name)) || (/log_?10|base[- ]?10/i.test(longName ?? '') && !/not log/i.test(longName ?? ''))
  const inside = fileUnit === null ? null : insideLog10(fileUnit)
  if (saysLog10 && (fileUnit === null || inside === '' || isBare(fileUnit))) {
    return {
      ...other,
      quantity: 'chlorophyll',
      unit: 'mg m-3',
      log10: true,
      note: 'stored as base-10 logarithm, of mg m-3',
      warning: `${name} is named like a base-10 logarithm and is read as one, of mg m-3: its unit (${fileUnit ?? 'none'}) does not say of what.`,
    }
  }
  if (saysLog10 && inside === null) {
    // Name and unit disagree, and the wrong choice would be wrong tenfold and more: the feed has to say.
    return {
      ...other,
      warning: `${name} is named like a base-10 logarithm, but its unit (${fileUnit ?? 'none'}) does not say so.`,
    }
  }
  const factor = milligramsPerCubicMetre(inside ?? fileUnit ?? '')
  if (factor === null) return { ...other, warning: notConvertible(variable, 'chlorophyll') }
  const notes = [
    ...(inside === null ? [] : ['stored as base-10 logarithm']),
    ...(factor === 1 ? [] : [`${inside ?? fileUnit} to mg m-3`]),
  ]
  return {
    ...other,
    quantity: 'chlorophyll',
    unit: 'mg m-3',
    log10: inside !== null,
    factor,
    note: notes.length ? notes.join('; ') : null,
  }
}

function reflectanceWavelength({ name, standardName, wavelengthAttribute }: Named): number | null {
  const fromName = wavelengthInName(name)
  if (fromName !== null) return fromName
  if (standardName !== reflectanceStandardName) return null
  const anywhere = /(?:^|[^\d])(\d{3,4})(?:[^\d]|$)/.exec(baseName(name))
  return wavelengthAttribute ?? (anywhere ? Number(anywhere[1]) : null)
}

/** True for what is named as chlorophyll and would be taken for it if the file gave it a unit. */
export function isChlorophyllWithoutUnit(variable: Names & Pick<Named, 'fileUnit'>): boolean {
  return variable.fileUnit === null && meaningOf({ ...variable, fileUnit: 'mg m-3', wavelengthAttribute: null }).quantity === 'chlorophyll'
}

/** The wavelength in nm that the name of a reflectance says, as Rrs_443 does. */
export function wavelengthInName(name: string): number | null {
  const match = /^rrs_?(\d{3,4}(?:[._]\d+)?)(?:_(?:mean|avg|average|median))?$/i.exec(baseName(name))
  return match ? Number(match[1]!.replace('_', '.')) : null
}

/** True where the file itself says that a variable is stored as logarithms; its values are turned back as they are read. */
export const saysLogarithm = ({ conversion }: Pick<GridVariable, 'conversion'>): boolean => conversion !== null && conversion.includes('logarithm')

function notConvertible({ name, fileUnit }: Named, what: string): string {
  return fileUnit === null
    ? `${name} looks like ${what}, but the file gives it no unit.`
    : `${name} looks like ${what}, but its unit "${fileUnit}" is none Offing can convert.`
}

const baseName = (name: string): string => name.slice(name.lastIndexOf('/') + 1)
