import type { Feed } from './schemas/feeds'
import { rampColour, ramps, screenShares, type RampName, type Theme } from './ramps'

/** Changes whenever the same value may get another colour: pictures made before are made again. */
export const colouringVersion = 2

export interface Scale {
  /** `screen`: 0 or 1, told by two colours. */
  scale: 'log' | 'linear' | 'screen'
  from: number
  to: number
}

/** How the values of a quantity become colours. Map, legend and quick look all read this. */
export interface Colouring extends Scale {
  ramp: RampName
  /** What the range was taken from. */
  rangeFrom: 'quantity' | 'valid range' | 'layer'
}

export type ColouredFeed = Pick<Feed, 'quantity' | 'variable' | 'unit' | 'scale' | 'validMin' | 'validMax'>

/** Where most of a layer lies: its 2nd and 98th percentile over cells. */
export interface Spread {
  p2: number
  p98: number
}

const known = (ramp: RampName, scale: Colouring['scale'], from: number, to: number): Colouring => ({ ramp, scale, from, to, rangeFrom: 'quantity' })
const around0 = (most: number) => known('departure', 'linear', -most, most)

/** Line heights and indices by the name their variable goes by, with the unit the range is meant in. */
const lines: { name: RegExp; unit: RegExp; colouring: Colouring }[] = [
  { name: /^n?flh$/, unit: /^mW cm-2 um-1 sr-1$/, colouring: around0(0.1) },
  { name: /^n?flh$/, unit: /^sr-1$/, colouring: around0(0.002) },
  { name: /^mci$/, unit: /^sr-1$/, colouring: around0(0.004) },
  { name: /^ci_cyano$/, unit: /^sr-1$/, colouring: around0(0.004) },
  { name: /^rbd$/, unit: /^W m-2 um-1 sr-1$/, colouring: around0(1) },
]
const screens = /^(bright|turbid)_water$/

/**
 * The colouring of a quantity Offing knows; of any other the feed's own valid range. Null where neither is there and
 * the layer's own spread has to be asked for.
 */
export function colouringOf(feed: ColouredFeed): Colouring | null {
  const { quantity, unit, validMin, validMax } = feed
  const name = feed.variable.slice(feed.variable.lastIndexOf('/') + 1).toLowerCase()
  const unitText = unit ?? ''
  if (quantity === 'chlorophyll') return known('sea', 'log', 0.03, 30)
  if (quantity === 'reflectance') return known('sea', 'log', 0.0001, 0.03)
  if (screens.test(name)) return known('sea', 'screen', 0, 1)
  const line = lines.find((one) => one.name.test(name) && one.unit.test(unitText))
  if (line) return line.colouring
  if (/^(FNU|FTU|NTU)$/i.test(unitText)) return known('sea', 'log', 0.1, 100)
  if (unitText === 'mol m-3' && /^(pic|calcite)/.test(name)) return known('sea', 'log', 0.00001, 0.03)
  if (validMin === null || validMax === null || validMin >= validMax) return null
  return { ...fitted(validMin, validMax, feed.scale), rangeFrom: 'valid range' }
}

/** The colouring of a quantity nobody told Offing about: fitted to where most of this one layer lies. */
export function colouringOfSpread(feed: ColouredFeed, spread: Spread | null): Colouring {
  return { ...fitted(spread?.p2 ?? 0, spread?.p98 ?? 1, feed.scale), rangeFrom: 'layer' }
}

/** Rounded outwards to two digits, so that the ends can be read; around 0 where values lie on both sides of it. */
function fitted(low: number, high: number, feedScale: 'log10' | 'linear'): Omit<Colouring, 'rangeFrom'> {
  const log = feedScale === 'log10' && low > 0
  if (low < 0 && high > 0 && !log) {
    const most = rounded(Math.max(-low, high), Math.ceil)
    return { ramp: 'departure', scale: 'linear', from: -most, to: most }
  }
  const from = rounded(low, Math.floor)
  const to = rounded(high, Math.ceil)
  if (from < to) return { ramp: 'sea', scale: log && from > 0 ? 'log' : 'linear', from, to }
  // A layer of one value alone still needs a scale to stand on.
  const around = Math.abs(low) / 2 || 1
  return { ramp: 'sea', scale: 'linear', from: low - around, to: low + around }
}

function rounded(value: number, round: (value: number) => number): number {
  if (value === 0) return 0
  const power = Math.floor(Math.log10(Math.abs(value))) - 1
  // Through text, because 3 * 10 ** -5 is not 0.00003.
  return Number(`${round(Number(`${value}e${-power}`) || value / 10 ** power)}e${power}`)
}

/** Where a value stands between the ends of its scale, 0..1; beyond them it stays at the end. NaN for NaN. */
export function shareOf({ scale, from, to }: Scale, value: number): number {
  if (Number.isNaN(value)) return NaN
  if (scale === 'screen') return value > 0.5 ? 1 : 0
  const share = scale === 'log' ? (value > 0 ? Math.log(value / from) / Math.log(to / from) : 0) : (value - from) / (to - from)
  return Math.min(Math.max(share, 0), 1)
}

/** The value at a share of the way. */
export function valueAt({ scale, from, to }: Scale, share: number): number {
  return scale === 'log' ? from * (to / from) ** share : from + (to - from) * share
}

/** `shades` colours from one end of the scale to the other, three bytes each; a screen has its two only. */
export function shadesOf({ ramp, scale }: Colouring, theme: Theme, shades: number): Uint8Array {
  const table = new Uint8Array(shades * 3)
  for (let shade = 0; shade < shades; shade++) {
    const share = shade / (shades - 1)
    table.set(rampColour(ramps[ramp][theme], scale === 'screen' ? (share > 0.5 ? screenShares.yes : screenShares.no) : share), shade * 3)
  }
  return table
}

export interface Tick {
  at: number
  /** Where it stands on the scale, 0..1. */
  share: number
  /** Only some ticks carry a figure. */
  labelled: boolean
}

/** Ticks of a scale: 1 to 9 of each decade where it is logarithmic, else steps of 1, 2 or 5. */
export function ticksOf(colouring: Colouring): Tick[] {
  const { scale, from, to } = colouring
  if (scale === 'screen') return []
  const ticks = scale === 'log' ? decadeTicks(from, to) : evenTicks(from, to)
  return ticks.map(({ at, labelled }) => ({ at, labelled, share: shareOf(colouring, at) }))
}

function decadeTicks(from: number, to: number): Omit<Tick, 'share'>[] {
  const decades = Math.log10(to / from)
  const digits = decades > 3.2 ? [1] : decades > 1.2 ? [1, 3] : [1, 2, 5]
  const ticks: Omit<Tick, 'share'>[] = []
  for (let power = Math.floor(Math.log10(from)); power <= Math.ceil(Math.log10(to)); power++) {
    for (let digit = 1; digit <= 9; digit++) {
      const at = Number(`${digit}e${power}`)
      if (at >= from * 0.999 && at <= to * 1.001) ticks.push({ at, labelled: digits.includes(digit) })
    }
  }
  return ticks
}

function evenTicks(from: number, to: number): Omit<Tick, 'share'>[] {
  const rough = (to - from) / 5
  const power = Math.floor(Math.log10(rough))
  const step = [1, 2, 5, 10].map((digit) => Number(`${digit}e${power}`)).find((one) => one >= rough * 0.999)!
  const ticks: Omit<Tick, 'share'>[] = []
  for (let k = Math.ceil(from / step - 1e-9); k * step <= to + step * 1e-9; k++) ticks.push({ at: Number((k * step).toPrecision(12)), labelled: true })
  return ticks
}
