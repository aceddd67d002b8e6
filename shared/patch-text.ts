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

/** The largest patch of a view in one sentence: area, greatest value, and where it lies from the site. */
export function patchSentence(patch: EvidencePatch, unit: string | null): string {
  const { nearest, peakAway, siteName, latitude, longitude } = patch
  const inUnit = (value: number) => `${figureText(value)}${unit && unit !== '1' ? ` ${unitWords(unit)}` : ''}`
  const reaches = `reaches ${inUnit(patch.greatest)}`
  const covers = `The largest patch at or above ${inUnit(patch.level)} covers ${areaText(patch)}`
  const site = siteName ?? 'the site'
  if (!nearest || !peakAway) return `${covers} and ${reaches} at ${placeText(latitude, longitude)}.`
  if (nearest.bearing === null) return `${covers}, holds ${site} and ${reaches}, ${awayText(peakAway, siteName ? 'it' : site)}.`
  if (nearest.km === peakAway.km) return `${covers} and ${reaches}, ${awayText(peakAway, site)}.`
  return `${covers}, begins ${awayText(nearest, site)} and ${reaches} ${awayText(peakAway, siteName ? 'it' : site)}.`
}

function placeText(latitude: number, longitude: number): string {
  return `${Math.abs(latitude).toFixed(2)}° ${latitude < 0 ? 'S' : 'N'}, ${Math.abs(longitude).toFixed(2)}° ${longitude < 0 ? 'W' : 'E'}`
}
