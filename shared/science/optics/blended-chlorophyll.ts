/**
 * The windows (mg m-3 by the colour index) in which colour index and band ratio are blended. A window belongs to its
 * coefficients: 0.15-0.20 went with those of 2012, 0.25-0.35 goes with those of 2019 (both verified); the paper of
 * 2012 itself says 0.25-0.30 (from memory).
 */
export const blendWindows = {
  '2012': [0.15, 0.2],
  '2012-paper': [0.25, 0.3],
  '2019': [0.25, 0.35],
} as const
export type BlendVersion = keyof typeof blendWindows

/**
 * Chlorophyll-a in mg m-3: the colour index's at or below the window, the band ratio's at or above it, in between each
 * by its share. Where the one that counts is missing (NaN), so is the answer.
 */
export function blendedChlorophyll(byColourIndex: number, byBandRatio: number, version: BlendVersion): number {
  const [low, high] = blendWindows[version]
  if (Number.isNaN(byColourIndex)) return NaN
  if (byColourIndex <= low) return byColourIndex
  if (byColourIndex >= high) return byBandRatio
  const share = (byColourIndex - low) / (high - low)
  return byColourIndex * (1 - share) + byBandRatio * share
}
