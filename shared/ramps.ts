export type Rgb = readonly [red: number, green: number, blue: number]
export type Theme = 'light' | 'night'

export interface RampStop {
  at: number
  colour: string
}

const stops = (from: number, to: number, colours: string): RampStop[] =>
  colours.split(' ').map((colour, i, all) => ({ at: from * (to / from) ** (i / (all.length - 1)), colour }))

/** Chlorophyll, mg m-3, logarithmic from 0.03 to 30; even steps of lightness on an OKLab path. */
export const chlorophyllRamp: Record<Theme, RampStop[]> = {
  light: stops(0.03, 30, '#22175b #282c66 #2e3e70 #35517a #3c6382 #447787 #4e8a8b #579d8e #72ae90 #95bb90 #b7c98f #d8d68d #f9e38a'),
  night: stops(0.03, 30, '#1e1155 #22245e #263566 #2a466e #2f5774 #356877 #3c797a #448a7b #5d987b #7ea379 #9eae76 #bcb972 #dac46b'),
}

/** Times usual, logarithmic from 1/8 to 8 around 1. */
export const departureRamp: Record<Theme, RampStop[]> = {
  light: stops(0.125, 8, '#00486a #30607e #537991 #7693a4 #9aadb8 #bfc8ca #e6e2da #d9c0b0 #c8a08b #b58066 #a16143 #8c431e #702900'),
  night: stops(0.125, 8, '#7cb9e1 #6da0c0 #5f87a1 #516f82 #445763 #374146 #2c2b29 #4d3b31 #6d4b3c #8d5d47 #af6f52 #d1825f #f4956c'),
}

/** The colour of a value: between two stops through OKLab, beyond the ends the end's own colour. */
export function rampColour(ramp: RampStop[], value: number): Rgb {
  const first = ramp[0]!
  const last = ramp.at(-1)!
  const place = (Math.log(value / first.at) / Math.log(last.at / first.at)) * (ramp.length - 1)
  const clipped = Math.min(Math.max(Number.isNaN(place) ? 0 : place, 0), ramp.length - 1)
  const lower = Math.min(Math.floor(clipped), ramp.length - 2)
  return mixed(rgbOf(ramp[lower]!.colour), rgbOf(ramp[lower + 1]!.colour), clipped - lower)
}

function rgbOf(hex: string): Rgb {
  const number = parseInt(hex.slice(1), 16)
  return [number >> 16, (number >> 8) & 255, number & 255]
}

function mixed(a: Rgb, b: Rgb, share: number): Rgb {
  const [x, y] = [okLab(a), okLab(b)]
  return rgbFromOkLab([0, 1, 2].map((i) => x[i]! + (y[i]! - x[i]!) * share))
}

const linear = (c: number) => (c <= 10.31475 ? c / 255 / 12.92 : ((c / 255 + 0.055) / 1.055) ** 2.4)
const gamma = (c: number) => Math.round(255 * Math.min(1, Math.max(0, c <= 0.0031308 ? c * 12.92 : 1.055 * c ** (1 / 2.4) - 0.055)))

/** OKLab after Ottosson 2020, "A perceptual color space for image processing" (matrices from memory). */
function okLab([red, green, blue]: Rgb): number[] {
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
