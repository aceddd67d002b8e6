import { describe, expect, it } from 'vitest'
import { bandRatioSets, type BandRatioSet } from '../../shared/science/optics/band-ratio-sets'
import { bandRatioChlorophyll, chlorophyllOfRatio } from '../../shared/science/optics/band-ratio-chlorophyll'
import { blendedChlorophyll, blendWindows, type BlendVersion } from '../../shared/science/optics/blended-chlorophyll'
import { brightWater } from '../../shared/science/optics/bright-water'
import { calciteMolPerM3, type CalciteVersion } from '../../shared/science/optics/calcite'
import { case1GreenLimit } from '../../shared/science/optics/case1-green-limit'
import { colourIndex, colourIndexChlorophyll, colourIndexVersions } from '../../shared/science/optics/colour-index-chlorophyll'
import { differenceIndex, differenceIndexChlorophyll, lowestNdci } from '../../shared/science/optics/difference-index-chlorophyll'
import { bandDistance, formulaOf } from '../../shared/science/optics/formulas'
import { rrsAt555 } from '../../shared/science/optics/green-band-shift'
import { cyanobacteriaIndex, lineHeight, lineHeightBands } from '../../shared/science/optics/line-height'
import { redBandThreshold, wattsPerSquareMetre } from '../../shared/science/optics/red-band-difference'
import { turbidAboveRrs670, turbidityFnu } from '../../shared/science/optics/turbidity'
import { solarIrradiance, waterLeavingRadiance } from '../../shared/science/optics/water-leaving-radiance'
import bright from './values/optics-bright-water-and-calcite.json'
import chlorophyll from './values/optics-chlorophyll.json'
import lines from './values/optics-lines-and-turbidity.json'

/** Printed values are rounded: equal to the digits printed, six at most. */
const close = (found: number, printed: number, digits = 6) => {
  const room = Math.max(Math.abs(printed) * 0.5 * 10 ** (1 - digits), 1e-15)
  expect(Math.abs(found - printed), `${found} against ${printed}`).toBeLessThanOrEqual(room)
}

/** The names of the published table by ours. */
const published: Record<string, string> = {
  'oc4-seawifs 6': 'OC4_SeaWiFS_v6', 'oc4-meris 6': 'OC4E_MERIS_v6', 'oc3-modis 6': 'OC3M_MODIS_v6', 'oc3-viirs 6': 'OC3V_VIIRS_v6',
  'oc3-seawifs 6': 'OC3S_SeaWiFS_v6', 'oc2-seawifs 6': 'OC2S_SeaWiFS_v6', 'oc4-seawifs 4': 'OC4_v4', 'oc3-modis 4': 'OC3M_v4',
  'oc4-seawifs 2019': 'OC4_SeaWiFS_2019', 'oc4-olci 2019': 'OC4_OLCI_2019', 'oc4-meris 2019': 'OC4_MERIS_2019', 'oc3-modis 2019': 'OC3_MODIS_2019',
  'oc3-viirs 2019': 'OC3_VIIRS_2019', 'oc3-oli 2019': 'OC3_OLI_2019', 'oc4-modis 2019': 'OC4_MODIS_2019', 'oc4me 1': 'OC4Me_MERIS_OLCI',
}
const nameOf = (set: BandRatioSet) => published[`${set.name} ${set.version}`]

describe('band-ratio chlorophyll against the published table (verified coefficients, computed checks)', () => {
  it('has every set of the table and no other', () => {
    expect(bandRatioSets.map(nameOf).sort()).toEqual(chlorophyll.algorithms.map(({ id }) => id).sort())
  })

  it.each(chlorophyll.algorithms.map((one) => [one.id, one] as const))('%s has the published bands, coefficients and values', (id, one) => {
    const set = bandRatioSets.find((candidate) => nameOf(candidate) === id)!
    expect([set.blueNm, set.greenNm, set.coefficients]).toEqual([one.blue_nm, one.green_nm, one.coefficients])
    for (const { ratio, chl_mg_m3 } of one.check) close(chlorophyllOfRatio(ratio, set), chl_mg_m3)
    if (set.ratioOf !== 'Rrs') return
    const green = 0.002
    for (const { ratio, chl_mg_m3 } of one.check) close(bandRatioChlorophyll(set.blueNm.map((_, i) => (i === 0 ? ratio * green : 0.0005)), green, set), chl_mg_m3)
  })

  it('takes the validity rules from the published list', () => {
    expect(chlorophyll.validity).toMatchObject({ ratio_open_interval: [0.21, 30], chl_clip_mg_m3: [0.001, 1000], min_blue_rrs: -0.001, green_must_be_positive: true })
  })
})

describe('colour index and blend (verified)', () => {
  it('has the published coefficients and values', () => {
    const { coef_2012, coef_2019, check } = chlorophyll.colour_index
    expect(Object.values(colourIndexVersions).map(({ a, b }) => [a, b])).toEqual([coef_2012, coef_2019])
    for (const { rrs443, rrs555, rrs670, ci, chl_2012, chl_2019 } of check) {
      close(colourIndex(rrs443, rrs555, rrs670), ci)
      close(colourIndexChlorophyll(rrs443, rrs555, rrs670, '2012'), chl_2012)
      close(colourIndexChlorophyll(rrs443, rrs555, rrs670, '2019'), chl_2019)
    }
  })

  it('has the published windows, each with its coefficients', () => {
    const { interval_2012_operational, interval_2012_paper_from_memory, interval_2019, check } = chlorophyll.blend
    expect(blendWindows).toEqual({ '2012': interval_2012_operational, '2012-paper': interval_2012_paper_from_memory, '2019': interval_2019 })
    for (const { chl_ci, chl_ocx, interval, blended } of check) {
      const version = (Object.keys(blendWindows) as BlendVersion[]).find((one) => blendWindows[one].join() === interval.join())!
      close(blendedChlorophyll(chl_ci, chl_ocx, version), blended)
    }
    // From the methods' text: 0.18 and 0.30 in the window 0.15-0.20.
    close(blendedChlorophyll(0.18, 0.3, '2012'), 0.252)
  })

  it('shifts a green band to 555 nm as published', () => {
    for (const { nm, rrs, rrs555 } of chlorophyll.green_band_shift_to_555.check) close(rrsAt555(rrs, nm), rrs555)
  })
})

describe('line heights, indices and turbidity', () => {
  const item = (id: string) => lines.items.find((one) => one.id === id)!

  it('FLH of MODIS (verified), FLH of MERIS and OLCI, MCI (from memory), SS681 (form verified)', () => {
    const ours = { FLH_MODIS: 'flh-modis', FLH_MERIS_OLCI: 'flh-olci', MCI: 'mci', SS681: 'ss681' } as const
    for (const [id, name] of Object.entries(ours)) {
      expect(lineHeightBands[name]).toEqual(item(id).nm)
      const checks = item(id).check as { x: [number, number, number]; lh?: number; ss?: number }[]
      expect(checks.length).toBeGreaterThan(0)
      for (const { x, lh, ss } of checks) close(lineHeight(x, lineHeightBands[name]), (lh ?? ss)!)
    }
    close(cyanobacteriaIndex([0.012, 0.011, 0.014]), 0.0017428571)
  })

  it('FLH of OLCI is offered for derived feeds by the bands it was published with (usage from memory)', () => {
    const formula = formulaOf('flh-olci', '1999')!
    expect(formula).toMatchObject({ unit: 'sr-1', status: 'from memory', bands: [{ nm: [665] }, { nm: [681.25] }, { nm: [708.75] }] })
    close(formula.value([0.5, 0.6, 0.4], [665, 681.25, 708.75]), 0.1371428571)
    expect(formula.value([0.5, NaN, 0.4], [665, 681.25, 708.75])).toBeNaN()
    expect(bandDistance(formula.bands[1]!, 681)).toBeCloseTo(0.25, 9)
  })

  it('NDCI (verified)', () => {
    for (const { rrs665, rrs708, ndci, chl } of item('NDCI').check as { rrs665: number; rrs708: number; ndci: number; chl: number }[]) {
      expect(differenceIndex(rrs665, rrs708)).toBeCloseTo(ndci, 6)
      close(differenceIndexChlorophyll(rrs665, rrs708), chl)
    }
    expect(lowestNdci).toBeCloseTo(-0.22157, 5)
    expect(14.039 + lowestNdci * (86.115 + lowestNdci * 194.325)).toBeCloseTo(4.4985, 4)
  })

  it('turbidity (verified), its flag (verified) and the limit of green (verified)', () => {
    for (const { rho645, rho859, T } of lines.turbidity.check) close(turbidityFnu(rho645, rho859 ?? NaN), T)
    expect(turbidAboveRrs670).toBe(lines.turbid_flag.rrs670_gt)
    for (const { chl, rlim } of lines.case1_green_limit.check) close(case1GreenLimit(chl), rlim)
  })

  it('the threshold of the red band difference in both units (verified)', () => {
    expect(redBandThreshold).toBe(item('RBD').threshold_W_m2_um_sr)
    expect(redBandThreshold / wattsPerSquareMetre).toBeCloseTo(item('RBD').threshold_mW_cm2_um_sr!, 12)
  })

  it('water-leaving radiance (irradiances from memory)', () => {
    expect(solarIrradiance['modis-aqua']).toEqual(Object.fromEntries(Object.entries(chlorophyll.nlw.f0_modis_aqua_mW_cm2_um)))
    const irradiances: Record<number, number> = solarIrradiance['modis-aqua']
    for (const { band, rrs, nLw } of chlorophyll.nlw.check) close(waterLeavingRadiance(rrs, irradiances[band]!), nLw)
  })
})

describe('bright water and calcite', () => {
  it('the coccolith screen (verified)', () => {
    for (const { nLw443, nLw510, nLw555, flag } of bright.coccolith_flag.check) {
      expect(brightWater({ nlw443: nLw443, nlw510: nLw510, nlw555: nLw555 })).toBe(flag)
    }
  })

  it('calcite of three versions (verified; 2021 as a code comment)', () => {
    const versions: Record<string, CalciteVersion> = { '2017': '2017', 'linear-revision-2021': '2021', 'power-revision-2026': '2026' }
    expect(bright.pic_ci.map(({ id }) => id)).toEqual(Object.keys(versions))
    for (const { id, check } of bright.pic_ci) {
      for (const { diff, pic } of check) close(calciteMolPerM3(diff + 0.001, 0.001, versions[id]!), pic, 5)
    }
  })
})
