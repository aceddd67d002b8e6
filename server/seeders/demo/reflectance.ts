import type { ReflectanceBand } from './scenario-feeds'

/** log10 chlorophyll of a log10 band ratio: the four-band polynomial for 443, 490, 510 over 555 nm, version 6. */
export function bandRatioLog10(x: number): number {
  return 0.3272 + x * (-2.994 + x * (2.7218 + x * (-1.2259 + x * -0.5683)))
}

const ratioStep = 0.002
const ratios = Float64Array.from({ length: 841 }, (_, i) => 1 - i * ratioStep)

/** The polynomial turned round: log10 ratio that gives this log10 chlorophyll (within 0.02 to 90 mg m-3). */
export function log10RatioOf(chlorophyllLog10: number): number {
  let low = 0
  let high = ratios.length - 1
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (bandRatioLog10(ratios[middle] ?? 0) < chlorophyllLog10) low = middle
    else high = middle
  }
  const [a, b] = [bandRatioLog10(ratios[low] ?? 0), bandRatioLog10(ratios[high] ?? 0)]
  const share = Math.min(1, Math.max(0, (chlorophyllLog10 - a) / (b - a)))
  return (ratios[low] ?? 0) - share * ratioStep
}

/**
 * Remote-sensing reflectances (sr-1) of one cell that give back its chlorophyll by the band ratio above. `silt` and
 * `chalk` (0 to 1) brighten the water: silt in the red and green, chalk everywhere and in the green most.
 */
export function reflectances(chlorophyllLog10: number, silt: number, chalk: number): Record<ReflectanceBand, number> {
  const clear = 0.0023 * 10 ** (0.15 * chlorophyllLog10)
  const green = clear * (1 + 1.6 * silt + 7 * chalk)
  const bluest = green * 10 ** log10RatioOf(chlorophyllLog10)
  // Which blue band is the brightest shifts from 443 to 510 nm as chlorophyll rises.
  const at490 = -0.22 * (chlorophyllLog10 - 0.35)
  const at443 = 0.187 - 0.45 * (chlorophyllLog10 + 0.5)
  const brightest = Math.max(0, at490, at443)
  const red = (0.00012 + 0.00007 * 10 ** (0.6 * chlorophyllLog10)) * (1 + 6 * chalk) + 0.003 * silt
  return {
    443: bluest * 10 ** (at443 - brightest),
    490: bluest * 10 ** (at490 - brightest),
    510: bluest * 10 ** -brightest,
    555: green,
    670: red,
  }
}
