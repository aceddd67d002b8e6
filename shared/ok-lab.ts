export type Rgb = readonly [red: number, green: number, blue: number]

/** "#22175b" as its three parts. */
export function rgbOf(hex: string): Rgb {
  const number = parseInt(hex.slice(1), 16)
  return [number >> 16, (number >> 8) & 255, number & 255]
}

/** A share of the way from one colour to another, through OKLab. */
export function mixed(a: Rgb, b: Rgb, share: number): Rgb {
  const [x, y] = [okLab(a), okLab(b)]
  return rgbFromOkLab([0, 1, 2].map((i) => x[i]! + (y[i]! - x[i]!) * share))
}

const linear = (c: number) => (c <= 10.31475 ? c / 255 / 12.92 : ((c / 255 + 0.055) / 1.055) ** 2.4)
const gamma = (c: number) => Math.round(255 * Math.min(1, Math.max(0, c <= 0.0031308 ? c * 12.92 : 1.055 * c ** (1 / 2.4) - 0.055)))

/** Lightness 0..1, a and b of an sRGB colour; Ottosson 2020, "A perceptual color space for image processing". */
export function okLab([red, green, blue]: Rgb): number[] {
  const [r, g, b] = [linear(red), linear(green), linear(blue)]
  const l = Math.cbrt(0.4122214708 * r + 0.5363325363 * g + 0.0514459929 * b)
  const m = Math.cbrt(0.2119034982 * r + 0.6806995451 * g + 0.1073969566 * b)
  const s = Math.cbrt(0.0883024619 * r + 0.2817188376 * g + 0.6299787005 * b)
  return [
    0.2104542553 * l + 0.793617785 * m - 0.0040720468 * s,
    1.9779984951 * l - 2.428592205 * m + 0.4505937099 * s,
    0.0259040371 * l + 0.7827717662 * m - 0.808675766 * s,
  ]
}

function rgbFromOkLab([lightness, a, b]: number[]): Rgb {
  const l = (lightness! + 0.3963377774 * a! + 0.2158037573 * b!) ** 3
  const m = (lightness! - 0.1055613458 * a! - 0.0638541728 * b!) ** 3
  const s = (lightness! - 0.0894841775 * a! - 1.291485548 * b!) ** 3
  return [
    gamma(4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s),
    gamma(-1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s),
    gamma(-0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s),
  ]
}
