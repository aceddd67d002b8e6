import { isPerSteradian, milligramsPerCubicMetre } from './read/units'

/** What a number in `from` is multiplied by to be in `to`, a feed's unit; null where Offing knows no such conversion. */
export function unitFactor(from: string, to: string | null): number | null {
  if (to === 'mg m-3') return milligramsPerCubicMetre(from)
  if (to === 'sr-1') return isPerSteradian(from) ? 1 : null
  return from.trim() === to ? 1 : null
}
