import { compassPoint } from './compass'
import { figureText, unitWords } from './figure-text'
import type { EvidencePatch } from './schemas/patches'

/** "6.2 km NE of the site"; "at the site" where it lies in the patch. */
export function awayText({ km, bearing }: { km: number; bearing: number | null }, of = 'the site'): string {
  return bearing === null ? `at ${of}` : `${kmText(km)} ${compassPoint(bearing)} of ${of}`
}

/** Tenths of a kilometre below 100, whole ones from there on. */
export function kmText(km: number): string {
  return `${km < 99.95 ? km.toFixed(1) : String(Math.round(km))} km`
}

/** "21 km²", "at least 21 km²". */
export function areaText({ areaKm2, atLeast }: { areaKm2: number; atLeast: boolean }): string {
  return `${atLeast ? 'at least ' : ''}${figureText(areaKm2)} km²`
}

/** The largest patch of a view in one sentence. */
export function patchSentence(patch: EvidencePatch, unit: string | null): string {
  const inUnit = (value: number) => `${figureText(value)}${unit && unit !== '1' ? ` ${unitWords(unit)}` : ''}`
  const site = patch.siteName ? patch.siteName : 'the site'
  const where = patch.nearest ? `, ${awayText(patch.nearest, site)}` : ''
  const peak = patch.peakAway && patch.peakAway.bearing !== null && patch.nearest ? `, the greatest value ${awayText(patch.peakAway, 'it')}` : ''
  return `The largest patch at or above ${inUnit(patch.level)} covers ${areaText(patch)} and reaches ${inUnit(patch.greatest)}${where}${peak}.`
}
