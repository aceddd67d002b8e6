import { describe, expect, it } from 'vitest'
import { regionOf, scenarioDays } from '../../../server/seeders/demo/scenario'
import { derivedFeeds } from '../../../server/seeders/demo/scenario-derived'
import { feeds } from '../../../server/seeders/demo/scenario-feeds'
import { bandRatioLog10, reflectances } from '../../../server/seeders/demo/reflectance'
import { newFeed } from '../../../shared/schemas/feeds'
import { chlorophyllOfRatio } from '../../../shared/science/optics/band-ratio-chlorophyll'
import { bandRatioSet } from '../../../shared/science/optics/band-ratio-sets'
import { formulaOf } from '../../../shared/science/optics/formulas'

const nm = [443, 490, 510, 555, 670] as const
const inOrder = (name: string, version: string, rrs: Record<(typeof nm)[number], number>) => {
  const formula = formulaOf(name, version)!
  const wanted = formula.bands.map((band) => nm.find((one) => band.nm.includes(one))!)
  return formula.value(wanted.map((one) => rrs[one]), wanted)
}

describe('the demo from its reflectances', () => {
  it('makes feeds that exist from bands that exist', () => {
    expect(derivedFeeds.length).toBeGreaterThan(0)
    for (const { from, ...feed } of derivedFeeds) {
      expect(feeds.map(({ key }) => key)).toContain(from)
      expect(formulaOf(feed.formula, feed.formulaVersion)).not.toBeNull()
      expect(newFeed.safeParse({ ...feed, derivedFrom: 1 }).success).toBe(true)
    }
    expect(scenarioDays.firstOfReflectance).toBeLessThan(scenarioDays.today)
    expect(regionOf('tarrow').feed).toBe('chl')
  })

  it('gives back by OC4 version 6 the chlorophyll the bands were made from, and the polynomial is the published one', () => {
    for (const chl of [0.05, 0.2, 1, 5, 30]) {
      expect(inOrder('oc4-seawifs', '6', reflectances(Math.log10(chl), 0, 0))).toBeCloseTo(chl, chl < 1 ? 3 : 1)
    }
    expect(10 ** bandRatioLog10(0.3)).toBeCloseTo(chlorophyllOfRatio(10 ** 0.3, bandRatioSet('oc4-seawifs', '6')), 12)
  })

  it('shows chalk in the bright-water screen and silt in the turbid-water screen, and plain blooms in neither', () => {
    const bloom = reflectances(Math.log10(8), 0, 0)
    const chalk = reflectances(Math.log10(0.8), 0, 1)
    const silt = reflectances(Math.log10(2), 1, 0)
    const screens = (rrs: typeof bloom) => [inOrder('bright-water', '1', rrs), inOrder('turbid-water', '1', rrs)]
    expect(screens(bloom)).toEqual([0, 0])
    expect(screens(silt)).toEqual([0, 1])
    expect(screens(chalk)[0]).toBe(1)
  })
})
