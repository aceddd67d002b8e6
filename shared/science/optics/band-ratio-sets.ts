/**
 * Coefficients of the maximum band ratio, by sensor and version.
 *
 * Version 6 and 4: O'Reilly et al. 1998, JGR 103:24937, doi:10.1029/98JC02160, with the coefficients of the public
 * Level-2 processing source. Version 2019: O'Reilly & Werdell 2019, RSE 229:32-47, doi:10.1016/j.rse.2019.04.021,
 * table 6. All verified against those sources; that files name the green band of the 2019 MODIS sets 547 is from memory.
 */
export interface BandRatioSet {
  /** Name of the family, as formulas are chosen by. */
  name: string
  version: string
  title: string
  blueNm: readonly number[]
  greenNm: number
  /** Another name of the green band in the sensor's files. */
  greenNamedNm?: number
  coefficients: readonly [number, number, number, number, number]
  /** What the ratio is of; remote-sensing reflectance unless said. */
  ratioOf: 'Rrs' | 'irradiance reflectance'
}

const four = [443, 490, 510] as const

function set(
  name: string,
  version: string,
  title: string,
  bands: { blueNm: readonly number[]; greenNm: number; greenNamedNm?: number; ratioOf?: BandRatioSet['ratioOf'] },
  coefficients: BandRatioSet['coefficients'],
): BandRatioSet {
  return { name, version, title, coefficients, ratioOf: 'Rrs', ...bands }
}

export const bandRatioSets: readonly BandRatioSet[] = [
  set('oc4-seawifs', '4', 'OC4 SeaWiFS', { blueNm: four, greenNm: 555 }, [0.366, -3.067, 1.93, 0.649, -1.532]),
  set('oc3-modis', '4', 'OC3 MODIS', { blueNm: [443, 488], greenNm: 551 }, [0.283, -2.753, 1.457, 0.659, -1.403]),
  set('oc4-seawifs', '6', 'OC4 SeaWiFS', { blueNm: four, greenNm: 555 }, [0.3272, -2.994, 2.7218, -1.2259, -0.5683]),
  set('oc4-meris', '6', 'OC4E MERIS', { blueNm: four, greenNm: 560 }, [0.3255, -2.7677, 2.4409, -1.1288, -0.499]),
  set('oc3-modis', '6', 'OC3 MODIS', { blueNm: [443, 488], greenNm: 547 }, [0.2424, -2.7423, 1.8017, 0.0015, -1.228]),
  set('oc3-viirs', '6', 'OC3 VIIRS', { blueNm: [443, 486], greenNm: 551 }, [0.2228, -2.4683, 1.5867, -0.4275, -0.7768]),
  set('oc3-seawifs', '6', 'OC3 SeaWiFS', { blueNm: [443, 490], greenNm: 555 }, [0.2515, -2.3798, 1.5823, -0.6372, -0.5692]),
  set('oc2-seawifs', '6', 'OC2 SeaWiFS', { blueNm: [490], greenNm: 555 }, [0.2511, -2.0853, 1.5035, -3.1747, 0.3383]),
  set('oc4-seawifs', '2019', 'OC4 SeaWiFS', { blueNm: four, greenNm: 555 }, [0.32814, -3.20725, 3.22969, -1.36769, -0.81739]),
  set('oc4-olci', '2019', 'OC4 OLCI', { blueNm: four, greenNm: 560 }, [0.4254, -3.21679, 2.86907, -0.62628, -1.09333]),
  set('oc4-meris', '2019', 'OC4 MERIS', { blueNm: [442, 490, 510], greenNm: 560 }, [0.42487, -3.20974, 2.89721, -0.75258, -0.98259]),
  set('oc3-modis', '2019', 'OC3 MODIS', { blueNm: [442, 488], greenNm: 554, greenNamedNm: 547 }, [0.26294, -2.64669, 1.28364, 1.08209, -1.76828]),
  set('oc4-modis', '2019', 'OC4 MODIS', { blueNm: [412, 442, 488], greenNm: 554, greenNamedNm: 547 }, [0.27015, -2.47936, 1.53752, -0.13967, -0.66166]),
  set('oc3-viirs', '2019', 'OC3 VIIRS', { blueNm: [443, 486], greenNm: 551 }, [0.23548, -2.63001, 1.65498, 0.16117, -1.37247]),
  set('oc3-oli', '2019', 'OC3 Landsat-8 OLI', { blueNm: [443, 482], greenNm: 561 }, [0.30963, -2.40052, 1.28932, 0.52802, -1.33825]),
  // The European variant takes a ratio of irradiance reflectances: it is no formula for Rrs.
  set('oc4me', '1', 'OC4Me MERIS and OLCI', { blueNm: four, greenNm: 560, ratioOf: 'irradiance reflectance' }, [0.45, -3.259, 3.523, -3.359, 0.95]),
]

/** RangeError for a set that is not in the table. */
export function bandRatioSet(name: string, version: string): BandRatioSet {
  const found = bandRatioSets.find((one) => one.name === name && one.version === version)
  if (!found) throw new RangeError(`There is no band-ratio set ${name} of version ${version}.`)
  return found
}
