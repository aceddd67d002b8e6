import { compassPoint } from '../../../shared/compass'
import { unitWords } from '../../../shared/figure-text'
import { kmText } from '../../../shared/patch-text'
import type { Patch, PatchChange, RegionPatches } from '../../../shared/schemas/patches'
import { dayWithYear, shortDay } from '../../lib/dates'
import { countWords, degrees, percent, threeDigits } from '../../lib/format'

export const squareKm = (areaKm2: number): string => `${threeDigits(areaKm2)} km²`

/** "6.2 km NE"; "at the site" where it lies in the patch; the place itself where there is no site. */
export function whereWords({ nearest, peak }: Patch): string {
  if (!nearest) return `${degrees(peak.latitude, 'latitude')} ${degrees(peak.longitude, 'longitude')}`
  return nearest.bearing === null ? 'at the site' : `${kmText(nearest.km)} ${compassPoint(nearest.bearing)}`
}

/** Where its greatest value is, unless that is where it begins. */
export function peakWords({ nearest, peakAway }: Patch): string | undefined {
  if (!peakAway || nearest?.km === peakAway.km) return undefined
  return peakAway.bearing === null ? 'greatest at the site' : `greatest ${kmText(peakAway.km)} ${compassPoint(peakAway.bearing)}`
}

/** What became of it since the view before. */
export function changeWords(change: PatchChange | null): string {
  if (!change) return ''
  const { kind, together, changeKm2, moved } = change
  const others = together.length > 1 ? ` (${together.map(String).join(', ')} together)` : ''
  const by = changeKm2 < 0 ? 'less' : 'more'
  const way = moved && moved.bearing !== null && moved.km >= 1 ? `, moved ${kmText(moved.km)} ${compassPoint(moved.bearing)}` : ''
  switch (kind) {
    case 'new':
    case 'not seen before':
      return kind
    case 'grown':
    case 'shrunk':
      return `${kind} by ${squareKm(Math.abs(changeKm2))}${way}`
    case 'steady':
      return `hardly changed${way}`
    case 'joined':
      return `joined of several, ${squareKm(Math.abs(changeKm2))} ${by}${way}`
    case 'parted':
      return `parted${others}, ${squareKm(Math.abs(changeKm2))} ${by}${way}`
    case 'joined and parted':
      return `joined and parted${others}, ${squareKm(Math.abs(changeKm2))} ${by}${way}`
    case 'gone':
    case 'not seen now':
      return kind
  }
}

/** What the view before had that is not here now, and how well it saw. */
export function beforeWords({ before, gone, areaAboveKm2, answer }: RegionPatches): string | undefined {
  if (!before) return undefined
  const seen = before.coverage === null ? '' : `, which saw ${percent(before.coverage)} of the water`
  const head = answer === 'patches' ? `Changes are since the view of ${dayWithYear(before.day)}${seen}.` : `The usable view before is of ${dayWithYear(before.day)}${seen}.`
  // A view that saw nothing has no area to compare.
  const then = answer === 'nothing seen' || areaAboveKm2 === null ? ` ${squareKm(before.areaAboveKm2)} at or above the level then.` : ` Together ${squareKm(before.areaAboveKm2)} then, ${squareKm(areaAboveKm2)} now.`
  return `${head}${then}${lostWords(gone, 'gone')}${lostWords(gone, 'not seen now')}`
}

function lostWords(gone: RegionPatches['gone'], kind: 'gone' | 'not seen now'): string {
  const them = gone.filter((one) => one.kind === kind)
  if (them.length === 0) return ''
  const areas = them.slice(0, 3).map((one) => squareKm(one.areaKm2)).join(', ')
  return ` ${countWords(them.length, 'patch', 'patches')} of then ${them.length === 1 ? 'is' : 'are'} ${kind} (${areas}${them.length > 3 ? ' and smaller' : ''}).`
}

export const sinceWord = ({ before }: RegionPatches): string => (before ? `Since ${shortDay(before.day)}` : 'Since the view before')

export const inUnit = (value: number, unit: string | null): string => `${threeDigits(value)}${unit && unit !== '1' ? ` ${unitWords(unit)}` : ''}`
