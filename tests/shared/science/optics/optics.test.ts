import { describe, expect, it } from 'vitest'
import { bandRatioChlorophyll, chlorophyllOfRatio } from '../../../../shared/science/optics/band-ratio-chlorophyll'
import { bandRatioSet } from '../../../../shared/science/optics/band-ratio-sets'
import { blendedChlorophyll } from '../../../../shared/science/optics/blended-chlorophyll'
import { brightWater } from '../../../../shared/science/optics/bright-water'
import { calciteMolPerM3 } from '../../../../shared/science/optics/calcite'
import { greenExcessPercent } from '../../../../shared/science/optics/case1-green-limit'
import { colourIndex } from '../../../../shared/science/optics/colour-index-chlorophyll'
import { differenceIndexChlorophyll } from '../../../../shared/science/optics/difference-index-chlorophyll'
import { bandDistance, formulaOf, formulas } from '../../../../shared/science/optics/formulas'
import { rrsAt555 } from '../../../../shared/science/optics/green-band-shift'
import { fluorescenceLineHeight, lineHeight, lineHeightBands } from '../../../../shared/science/optics/line-height'
import { redBandDifference, redBandThreshold } from '../../../../shared/science/optics/red-band-difference'
import { turbidityFnu, turbidWater } from '../../../../shared/science/optics/turbidity'
import { belowSurfaceReflectance, waterReflectance } from '../../../../shared/science/optics/water-leaving-radiance'

const oc4 = bandRatioSet('oc4-seawifs', '2019')

describe('band-ratio chlorophyll', () => {
  it('takes the logarithm of the ratio: at ratio 1 it is 10 to a0', () => {
    expect(chlorophyllOfRatio(1, oc4)).toBeCloseTo(10 ** 0.32814, 12)
    // The polynomial of the ratio itself, a known slip, would give a value below 0.01 here.
    expect(chlorophyllOfRatio(1, oc4)).toBeGreaterThan(2)
  })

  it('takes the brightest of its blue bands', () => {
    expect(bandRatioChlorophyll([0.002, 0.004, 0.003], 0.002, oc4)).toBeCloseTo(chlorophyllOfRatio(2, oc4), 12)
  })

  it('has no value where a band is missing, even if another is brighter', () => {
    expect(bandRatioChlorophyll([0.004, NaN, 0.003], 0.002, oc4)).toBeNaN()
    expect(bandRatioChlorophyll([0.004, 0.003, 0.003], NaN, oc4)).toBeNaN()
  })

  it('has no value outside its validity: green, longest blue, short blues and ratio', () => {
    expect(bandRatioChlorophyll([0.004, 0.003, 0.003], 0, oc4)).toBeNaN()
    expect(bandRatioChlorophyll([0.004, 0.003, -0.0001], 0.002, oc4)).toBeNaN()
    expect(bandRatioChlorophyll([-0.0011, 0.003, 0.003], 0.002, oc4)).toBeNaN()
    expect(bandRatioChlorophyll([-0.0009, 0.003, 0.003], 0.002, oc4)).toBeGreaterThan(0)
    expect(bandRatioChlorophyll([0.0004, 0.0002, 0.0002], 0.002, oc4)).toBeNaN()
    expect(bandRatioChlorophyll([0.06, 0.002, 0.002], 0.002, oc4)).toBeNaN()
  })

  it('is clipped to 0.001..1000', () => {
    expect(chlorophyllOfRatio(29, oc4)).toBe(0.001)
    expect(chlorophyllOfRatio(0.22, { coefficients: [9, 0, 0, 0, 0] })).toBe(1000)
  })

  it('refuses a set for irradiance reflectance, a wrong number of bands and an unknown set', () => {
    expect(() => bandRatioChlorophyll([0.004, 0.003, 0.003], 0.002, bandRatioSet('oc4me', '1'))).toThrow(/irradiance reflectance/)
    expect(() => bandRatioChlorophyll([0.004], 0.002, oc4)).toThrow(RangeError)
    expect(() => bandRatioSet('oc4-seawifs', '2031')).toThrow(/no band-ratio set oc4-seawifs of version 2031/)
  })
})

describe('colour index and blend', () => {
  it('is not above 0', () => {
    expect(colourIndex(0.002, 0.009, 0.001)).toBe(0)
    expect(colourIndex(NaN, 0.009, 0.001)).toBeNaN()
  })

  it('blends by the window of its version: the same two values differ from version to version', () => {
    expect(blendedChlorophyll(0.27, 0.4, '2012')).toBe(0.4)
    expect(blendedChlorophyll(0.27, 0.4, '2012-paper')).toBeCloseTo(0.27 * 0.6 + 0.4 * 0.4, 12)
    expect(blendedChlorophyll(0.27, 0.4, '2019')).toBeCloseTo(0.296, 12)
  })

  it('needs only the part that counts', () => {
    expect(blendedChlorophyll(0.1, NaN, '2019')).toBe(0.1)
    expect(blendedChlorophyll(0.3, NaN, '2019')).toBeNaN()
    expect(blendedChlorophyll(NaN, 0.4, '2019')).toBeNaN()
  })

  it('leaves 555 nm as it is, and refuses a band it knows no shift from', () => {
    expect(rrsAt555(0.002, 554)).toBe(0.002)
    expect(() => rrsAt555(0.002, 531)).toThrow(/No shift from 531 nm/)
    expect(rrsAt555(NaN, 547)).toBeNaN()
    expect(rrsAt555(-0.001, 547)).toBeNaN()
  })
})

describe('line heights', () => {
  it.each(Object.entries(lineHeightBands))('%s of a straight spectrum is 0', (_, bands) => {
    const straight = (nm: number) => 0.02 - 0.00002 * nm
    expect(lineHeight([straight(bands[0]), straight(bands[1]), straight(bands[2])], bands)).toBeCloseTo(0, 15)
  })

  it('have no value with a missing band, and fluorescence none with a radiance below -0.01', () => {
    expect(lineHeight([0.1, NaN, 0.1], lineHeightBands.mci)).toBeNaN()
    expect(fluorescenceLineHeight([-0.011, 0.1, 0.1])).toBeNaN()
    expect(fluorescenceLineHeight([NaN, 0.1, 0.1])).toBeNaN()
    expect(fluorescenceLineHeight([0.1, 0.05, 0.1])).toBe(0)
  })
})

describe('other screens', () => {
  it('the difference index gives nothing left of its minimum, where the parabola would rise again', () => {
    expect(differenceIndexChlorophyll(0.006, 0.003)).toBeNaN()
    expect(differenceIndexChlorophyll(0.006, 0.0039)).toBeGreaterThan(4.49)
    expect(differenceIndexChlorophyll(0, 0)).toBeNaN()
    expect(differenceIndexChlorophyll(NaN, 0.002)).toBeNaN()
  })

  it('turbidity needs the near infrared only from 0.05 on, and has none at saturation or below 0', () => {
    expect(turbidityFnu(0.04, NaN)).toBeGreaterThan(0)
    expect(turbidityFnu(0.06, NaN)).toBeNaN()
    expect(turbidityFnu(0.08, 0.22)).toBeNaN()
    expect(turbidityFnu(-0.001, 0.01)).toBeNaN()
    expect(turbidityFnu(NaN, 0.01)).toBeNaN()
    expect([turbidWater(0.0012), turbidWater(0.0013), turbidWater(NaN)]).toEqual([0, 1, NaN])
  })

  it('bright water needs all its bands, and looks at the aerosol where it is known', () => {
    expect(brightWater({ nlw443: 1.5, nlw510: 1.6, nlw555: 1.3, aerosol670: 1.2 })).toBe(0)
    expect(brightWater({ nlw443: 1.5, nlw510: NaN, nlw555: 1.3 })).toBeNaN()
  })

  it('calcite has no value below 0, none for negative reflectance, and a floor of 0.00001', () => {
    expect(calciteMolPerM3(0.002, 0.0015, '2017')).toBeNaN()
    expect(calciteMolPerM3(-0.001, 0.001, '2026')).toBeNaN()
    expect(calciteMolPerM3(0.001, 0.002, '2026')).toBeNaN()
    expect(calciteMolPerM3(0.0023, 0.002, '2026')).toBe(1e-5)
    expect(calciteMolPerM3(NaN, 0.002, '2017')).toBeNaN()
  })

  it('calcite differs from version to version by more than a factor of 2', () => {
    const [first, second, third] = (['2017', '2021', '2026'] as const).map((version) => calciteMolPerM3(0.006, 0.001, version))
    expect(second! / first!).toBeGreaterThan(2)
    expect(second! / third!).toBeGreaterThan(5)
  })

  it('the red band difference turns the unit of files into the unit of its threshold', () => {
    expect(redBandDifference(0.05, 0.066)).toBeCloseTo(0.16, 12)
    expect(redBandDifference(0.05, 0.066)).toBeGreaterThan(redBandThreshold)
    expect(0.066 - 0.05).toBeLessThan(redBandThreshold)
  })

  it('reflectance below the surface and of water', () => {
    expect(belowSurfaceReflectance(0.004)).toBeCloseTo(0.00759301, 8)
    expect(waterReflectance(0.004)).toBeCloseTo(0.0125664, 7)
  })

  it('green is not judged against chlorophyll at or below 0.2', () => {
    expect(greenExcessPercent(0.005, 0.2)).toBeNaN()
    expect(greenExcessPercent(0.00662, 1)).toBeCloseTo(50, 9)
  })
})

describe('formulas for derived feeds', () => {
  it('are named once each, and none takes irradiance reflectance', () => {
    const names = formulas.map(({ name, version }) => `${name} ${version}`)
    expect(new Set(names).size).toBe(names.length)
    expect(formulaOf('oc4me', '1')).toBeNull()
    expect(formulaOf('oc4-seawifs', '7')).toBeNull()
  })

  it.each(formulas.map((one) => [`${one.name} ${one.version}`, one] as const))('%s has no value where any band is missing', (_, formula) => {
    const nm = formula.bands.map((band) => band.nm[0]!)
    const rrs = nm.map(() => 0.002)
    for (const at of formula.bands.keys()) {
      if (formula.name === 'turbidity' && at === 1) continue
      if (formula.name.startsWith('blend-')) continue
      expect(formula.value(rrs.map((value, i) => (i === at ? NaN : value)), nm)).toBeNaN()
    }
  })

  it('take the nearest band within their tolerance', () => {
    const { bands } = formulaOf('colour-index', '2019')!
    expect(bandDistance(bands[0]!, 443)).toBe(0)
    expect(bandDistance(bands[0]!, 442.5)).toBe(0.5)
    expect(bandDistance(bands[0]!, 488)).toBeNull()
    expect(bandDistance(bands[1]!, 555)!).toBeLessThan(bandDistance(bands[1]!, 547)!)
  })

  it('shift the green band of the file at hand', () => {
    const index = formulaOf('colour-index', '2019')!
    expect(index.value([0.005, 0.002, 0.00015], [443, 555, 670])).toBeCloseTo(0.270019, 6)
    expect(index.value([0.005, 0.002, 0.00015], [443, 547, 667])).not.toBeCloseTo(0.270019, 3)
  })

  it('blend with the window and index of their own version', () => {
    const nm = [443, 490, 510, 555, 443, 555, 670]
    const rrs = [0.008, 0.006, 0.004, 0.0016, 0.008, 0.0016, 0.0001]
    expect(formulaOf('blend-oc4-seawifs', '2019')!.value(rrs, nm)).toBeCloseTo(0.0987682, 6)
    expect(formulaOf('blend-oc4-seawifs', '2012')!.value(rrs, nm)).toBeCloseTo(0.107036, 6)
    expect(formulaOf('blend-oc4-seawifs', '6')).toBeNull()
  })
})
