import { describe, expect, it } from 'vitest'
import { colouringOf, colouringOfSpread, shadesOf, shareOf, ticksOf, type ColouredFeed } from '../../shared/colouring'
import { okLab, rgbOf, type Rgb } from '../../shared/ok-lab'
import { rampColour, ramps, screenShares } from '../../shared/ramps'
import { formulas } from '../../shared/science/optics/formulas'

const feed = (change: Partial<ColouredFeed>): ColouredFeed => ({ quantity: 'other', variable: 'thing', unit: null, scale: 'linear', validMin: null, validMax: null, ...change })
const lightness = (ramp: readonly string[]) => ramp.map((colour) => okLab(rgbOf(colour))[0]!)

/** Machado, Oliveira and Fernandes 2009, severity 1.0, for linear RGB (the tables printed with the paper). */
const deficiencies: Record<string, number[][]> = {
  protanopia: [[0.152286, 1.052583, -0.204868], [0.114503, 0.786281, 0.099216], [-0.003882, -0.048116, 1.051998]],
  deuteranopia: [[0.367322, 0.860646, -0.227968], [0.280085, 0.672501, 0.047413], [-0.01182, 0.04294, 0.968881]],
  tritanopia: [[1.255528, -0.076749, -0.178779], [-0.078411, 0.930809, 0.147602], [0.004733, 0.691367, 0.303900]],
}

function seenWith(matrix: number[][], rgb: Rgb): Rgb {
  const straight = rgb.map((c) => (c / 255 <= 0.04045 ? c / 255 / 12.92 : ((c / 255 + 0.055) / 1.055) ** 2.4))
  const [r, g, b] = matrix.map((row) => {
    const c = Math.min(1, Math.max(0, row.reduce((sum, m, i) => sum + m * straight[i]!, 0)))
    return 255 * (c <= 0.0031308 ? c * 12.92 : 1.055 * c ** (1 / 2.4) - 0.055)
  })
  return [r!, g!, b!]
}

const apart = (a: Rgb, b: Rgb) => Math.hypot(...okLab(a).map((c, i) => c - okLab(b)[i]!))

describe('the ramps', () => {
  it('are measured in OKLab as the CSS Color 4 recommendation prints it for red, lime and blue', () => {
    const printed: [string, number[]][] = [['#ff0000', [0.628, 0.2249, 0.1258]], ['#00ff00', [0.8664, -0.2339, 0.1795]], ['#0000ff', [0.452, -0.0325, -0.3115]]]
    for (const [colour, lab] of printed) okLab(rgbOf(colour)).forEach((c, i) => expect(c).toBeCloseTo(lab[i]!, 3))
  })

  it.each(['light', 'night'] as const)('rise in lightness by even steps (%s)', (theme) => {
    const steps = lightness(ramps.sea[theme]).slice(1).map((l, i) => l - lightness(ramps.sea[theme])[i]!)
    const mean = steps.reduce((a, b) => a + b) / steps.length
    for (const step of steps) expect(Math.abs(step - mean)).toBeLessThan(0.15 * Math.abs(mean))
  })

  it.each(['light', 'night'] as const)('diverge from a middle by even steps of lightness on either side (%s)', (theme) => {
    const of = lightness(ramps.departure[theme])
    const steps = of.slice(1).map((l, i) => Math.abs(l - of[i]!))
    const mean = steps.reduce((a, b) => a + b) / steps.length
    for (const step of steps) expect(Math.abs(step - mean)).toBeLessThan(0.25 * mean)
  })

  it.each(Object.keys(deficiencies))('keep their steps and their two ends apart under %s', (name) => {
    const matrix = deficiencies[name]!
    for (const theme of ['light', 'night'] as const) {
      for (const ramp of ['sea', 'departure'] as const) {
        const seen = ramps[ramp][theme].map((colour) => seenWith(matrix, rgbOf(colour)))
        for (const [i, colour] of seen.slice(1).entries()) expect(apart(colour, seen[i]!)).toBeGreaterThan(0.02)
        expect(apart(seen[0]!, seen.at(-1)!)).toBeGreaterThan(0.15)
      }
      const [no, yes] = [screenShares.no, screenShares.yes].map((share) => seenWith(matrix, rampColour(ramps.sea[theme], share)))
      expect(apart(no!, yes!)).toBeGreaterThan(0.3)
    }
  })
})

describe('a quantity', () => {
  it('has the scale it deserves', () => {
    expect(colouringOf(feed({ quantity: 'chlorophyll', unit: 'mg m-3', scale: 'log10' }))).toMatchObject({ ramp: 'sea', scale: 'log', from: 0.03, to: 30 })
    expect(colouringOf(feed({ quantity: 'reflectance', variable: 'Rrs_443', unit: 'sr-1' }))).toMatchObject({ ramp: 'sea', scale: 'log', from: 0.0001, to: 0.03 })
    expect(colouringOf(feed({ variable: 'turbid_water', unit: '1' }))).toMatchObject({ scale: 'screen' })
    expect(colouringOf(feed({ variable: 'geophysical_data/turbidity', unit: 'FNU' }))).toMatchObject({ scale: 'log', from: 0.1, to: 100 })
    expect(colouringOf(feed({ variable: 'mci', unit: 'sr-1' }))).toMatchObject({ ramp: 'departure', scale: 'linear', from: -0.004, to: 0.004 })
    expect(colouringOf(feed({ variable: 'sst', unit: 'degC', validMin: -2, validMax: 35 }))).toMatchObject({ ramp: 'departure', from: -35, to: 35, rangeFrom: 'valid range' })
    expect(colouringOf(feed({ variable: 'sst', unit: 'K' }))).toBeNull()
  })

  it('worked out by any formula Offing knows has a scale of its own, without asking the layer', () => {
    for (const { quantity, variable, unit, scale } of formulas) expect(colouringOf(feed({ quantity, variable, unit, scale }))?.rangeFrom).toBe('quantity')
  })

  it('nobody told of is fitted to the layer, rounded outwards, and survives a layer of one value or none', () => {
    expect(colouringOfSpread(feed({}), { p2: 12.34, p98: 17.81 })).toEqual({ ramp: 'sea', scale: 'linear', from: 12, to: 18, rangeFrom: 'layer' })
    expect(colouringOfSpread(feed({ scale: 'log10' }), { p2: 0.000314, p98: 0.0298 })).toMatchObject({ scale: 'log', from: 0.00031, to: 0.03 })
    expect(colouringOfSpread(feed({}), { p2: -0.31, p98: 0.12 })).toMatchObject({ ramp: 'departure', from: -0.31, to: 0.31 })
    for (const value of [0, 7, -7]) {
      const { from, to } = colouringOfSpread(feed({}), { p2: value, p98: value })
      expect(from).toBeLessThanOrEqual(value)
      expect(to).toBeGreaterThan(value)
    }
    expect(colouringOfSpread(feed({}), null)).toMatchObject({ from: 0, to: 1 })
  })

  it('places values on its scale, the ends holding what lies beyond', () => {
    const chlorophyll = { scale: 'log', from: 0.03, to: 30 } as const
    expect([0.03, 0.3, 3, 30, 300, 0, -1].map((value) => Number(shareOf(chlorophyll, value).toFixed(6)))).toEqual([0, 0.333333, 0.666667, 1, 1, 0, 0])
    expect(shareOf(chlorophyll, NaN)).toBeNaN()
    expect([0, 0.4, 1].map((value) => shareOf({ scale: 'screen', from: 0, to: 1 }, value))).toEqual([0, 0, 1])
  })

  it('paints a screen in two colours only', () => {
    const table = shadesOf({ ramp: 'sea', scale: 'screen', from: 0, to: 1, rangeFrom: 'quantity' }, 'light', 512)
    expect(new Set(Array.from({ length: 512 }, (_, i) => table.subarray(i * 3, i * 3 + 3).join()))).toHaveProperty('size', 2)
  })

  it('has few figures on its scale, all within it', () => {
    const labels = (colouring: Parameters<typeof ticksOf>[0]) => ticksOf(colouring).filter((tick) => tick.labelled).map((tick) => tick.at)
    expect(labels(colouringOf(feed({ quantity: 'chlorophyll', unit: 'mg m-3', scale: 'log10' }))!)).toEqual([0.03, 0.1, 0.3, 1, 3, 10, 30])
    expect(labels(colouringOf(feed({ variable: 'mci', unit: 'sr-1' }))!)).toEqual([-0.004, -0.002, 0, 0.002, 0.004])
    expect(labels(colouringOf(feed({ variable: 'pic', unit: 'mol m-3' }))!)).toEqual([0.00001, 0.0001, 0.001, 0.01])
    expect(labels(colouringOfSpread(feed({}), { p2: 12.34, p98: 17.81 }))).toEqual([12, 14, 16, 18])
  })
})
