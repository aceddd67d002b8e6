import { bandRatioChlorophyll } from './band-ratio-chlorophyll'
import { bandRatioSets, type BandRatioSet } from './band-ratio-sets'
import { blendedChlorophyll } from './blended-chlorophyll'
import { brightWater } from './bright-water'
import { calciteMolPerM3, calciteVersions, type CalciteVersion } from './calcite'
import { colourIndexChlorophyll, colourIndexVersions, type ColourIndexVersion } from './colour-index-chlorophyll'
import { differenceIndexChlorophyll } from './difference-index-chlorophyll'
import { rrsAt555, shiftableGreenNm } from './green-band-shift'
import { cyanobacteriaIndex, fluorescenceLineHeight, lineHeight, lineHeightBands } from './line-height'
import { redBandDifference } from './red-band-difference'
import { turbidityFnu, turbidWater } from './turbidity'
import { solarIrradiance, waterLeavingRadiance, waterReflectance } from './water-leaving-radiance'

/** A band a formula asks for: the first of `nm` that a file has within `toleranceNm` serves. */
export interface NeededBand {
  nm: readonly number[]
  toleranceNm: number
}

/** A published formula that makes a derived quantity of reflectances, cell by cell. */
export interface Formula {
  name: string
  version: string
  title: string
  /** What the derived feed's variable is called. */
  variable: string
  quantity: 'chlorophyll' | 'other'
  unit: string
  scale: 'log10' | 'linear'
  bands: readonly NeededBand[]
  /** How sure its numbers are. */
  status: 'verified' | 'from memory'
  /** What a person should know before using it; null where there is nothing to add. */
  caution: string | null
  /** Rrs in sr-1 in the order of `bands`, with the wavelength each really has; NaN is missing, in and out. */
  value: (rrs: readonly number[], nm: readonly number[]) => number
}

const band = (nm: number, toleranceNm = 2): NeededBand => ({ nm: [nm], toleranceNm })
const greenBand: NeededBand = { nm: shiftableGreenNm, toleranceNm: 2 }
const chlorophyll = { variable: 'chlor_a', quantity: 'chlorophyll', unit: 'mg m-3', scale: 'log10', status: 'verified', caution: null } as const
const other = { quantity: 'other', scale: 'linear', status: 'verified', caution: null } as const
const modis = solarIrradiance['modis-aqua']
const seawifs = solarIrradiance.seawifs
const irradianceCaution = 'Solar irradiances of the bands are from memory.'

function ratioBands(set: BandRatioSet): NeededBand[] {
  const green = set.greenNamedNm === undefined ? [set.greenNm] : [set.greenNm, set.greenNamedNm]
  return [...set.blueNm.map((nm) => band(nm)), { nm: green, toleranceNm: 2 }]
}

function ofBandRatio(set: BandRatioSet): Formula {
  return {
    ...chlorophyll, name: set.name, version: set.version, title: `Chlorophyll by band ratio ${set.title}`, bands: ratioBands(set),
    value: (rrs) => bandRatioChlorophyll(rrs.slice(0, -1), rrs.at(-1)!, set),
  }
}

const indexBands = [band(443), greenBand, band(670, 5)] as const

function byIndex([blue, green, red]: readonly number[], [, greenNm]: readonly number[], version: ColourIndexVersion): number {
  return colourIndexChlorophyll(blue!, rrsAt555(green!, greenNm!), red!, version)
}

function ofColourIndex(version: ColourIndexVersion): Formula {
  return {
    ...chlorophyll, name: 'colour-index', version, title: 'Chlorophyll by colour index', bands: indexBands,
    caution: 'Meant for chlorophyll up to 0.25 mg m-3.',
    value: (rrs, nm) => byIndex(rrs, nm, version),
  }
}

/** Window and colour index go with the version of the band ratio: 2012 with version 6, 2019 with 2019. */
function ofBlend(set: BandRatioSet): Formula {
  const version = set.version === '2019' ? '2019' : '2012'
  const ratio = ratioBands(set)
  return {
    ...chlorophyll, name: `blend-${set.name}`, version, bands: [...ratio, ...indexBands],
    title: `Chlorophyll by colour index and band ratio ${set.title}, blended`,
    value: (rrs, nm) => {
      const bySet = bandRatioChlorophyll(rrs.slice(0, ratio.length - 1), rrs[ratio.length - 1]!, set)
      return blendedChlorophyll(byIndex(rrs.slice(ratio.length), nm.slice(ratio.length), version), bySet, version)
    },
  }
}

function ofCalcite(version: CalciteVersion): Formula {
  return {
    ...other, name: 'calcite', version, title: 'Calcite (PIC) by colour index', variable: 'pic', unit: 'mol m-3',
    bands: [band(550, 10), band(667, 5)], caution: 'One cell is known to within a factor of 2 at best; versions differ by a factor of 3.',
    value: ([green, red]) => calciteMolPerM3(green!, red!, version),
  }
}

const triple = (rrs: readonly number[]) => [rrs[0]!, rrs[1]!, rrs[2]!] as const

const lines: Formula[] = [
  {
    ...other, name: 'flh-modis', version: '1996', title: 'Fluorescence line height (MODIS)', variable: 'flh', unit: 'mW cm-2 um-1 sr-1',
    bands: [667, 678, 748].map((nm) => band(nm, 1)), status: 'from memory', caution: irradianceCaution,
    value: ([first, peak, last]) => fluorescenceLineHeight([first! * modis[667], peak! * modis[678], last! * modis[748]]),
  },
  {
    ...other, name: 'flh-olci', version: '1999', title: 'Fluorescence line height (MERIS, OLCI)', variable: 'flh', unit: 'sr-1',
    bands: lineHeightBands['flh-olci'].map((nm) => band(nm, 1)), status: 'from memory', caution: 'Of reflectance rather than radiance: compare it only with itself.',
    value: (rrs) => lineHeight(triple(rrs), lineHeightBands['flh-olci']),
  },
  {
    ...other, name: 'mci', version: '2005', title: 'Maximum chlorophyll index', variable: 'mci', unit: 'sr-1',
    bands: lineHeightBands.mci.map((nm) => band(nm, 1)), status: 'from memory',
    value: (rrs) => lineHeight(triple(rrs), lineHeightBands.mci),
  },
  {
    ...other, name: 'cyanobacteria-index', version: '2008', title: 'Cyanobacteria index (spectral shape at 681 nm)', variable: 'ci_cyano', unit: 'sr-1',
    bands: lineHeightBands.ss681.map((nm) => band(nm, 1)),
    value: (rrs) => cyanobacteriaIndex(triple(rrs)),
  },
  {
    ...other, name: 'red-band-difference', version: '2009', title: 'Red band difference', variable: 'rbd', unit: 'W m-2 um-1 sr-1',
    bands: [band(667, 1), band(678, 1)], status: 'from memory', caution: `Made for one organism of one shelf. ${irradianceCaution}`,
    value: ([rrs667, rrs678]) => redBandDifference(waterLeavingRadiance(rrs667!, modis[667]), waterLeavingRadiance(rrs678!, modis[678])),
  },
]

const screens: Formula[] = [
  {
    ...chlorophyll, name: 'ndci', version: '2012', title: 'Chlorophyll by difference index of red bands', bands: [band(665), band(708)],
    caution: 'For turbid, productive water; no value left of the minimum of its parabola.',
    value: ([rrs665, rrs708]) => differenceIndexChlorophyll(rrs665!, rrs708!),
  },
  {
    ...other, name: 'turbidity', version: '2015', title: 'Turbidity', variable: 'turbidity', unit: 'FNU', bands: [band(645, 1), band(859)],
    value: ([rrs645, rrs859]) => turbidityFnu(waterReflectance(rrs645!), waterReflectance(rrs859!)),
  },
  {
    ...other, name: 'turbid-water', version: '1', title: 'Turbid-water screen', variable: 'turbid_water', unit: '1', bands: [band(670, 5)],
    caution: '1 where red is above 0.0012 sr-1: chlorophyll may be sediment there.',
    value: ([rrs670]) => turbidWater(rrs670!),
  },
  {
    ...other, name: 'bright-water', version: '1', title: 'Bright-water (coccolith) screen', variable: 'bright_water', unit: '1',
    bands: [band(443), band(510), band(555)], status: 'from memory',
    caution: `1 where water is as bright and white as shed coccoliths make it; chalk, bubbles, thin cloud, glint and shallows pass too. Aerosol is not looked at. ${irradianceCaution}`,
    value: ([rrs443, rrs510, rrs555]) =>
      brightWater({ nlw443: rrs443! * seawifs[443], nlw510: rrs510! * seawifs[510], nlw555: rrs555! * seawifs[555] }),
  },
]

const ofRrs = bandRatioSets.filter((set) => set.ratioOf === 'Rrs')

/** Every formula a derived feed can be made by; name and version together name one. */
export const formulas: readonly Formula[] = [
  ...ofRrs.map(ofBandRatio),
  ...(Object.keys(colourIndexVersions) as ColourIndexVersion[]).map(ofColourIndex),
  ...ofRrs.filter((set) => set.version !== '4').map(ofBlend),
  ...lines,
  ...screens,
  ...(Object.keys(calciteVersions) as CalciteVersion[]).map(ofCalcite),
]

export function formulaOf(name: string, version: string): Formula | null {
  return formulas.find((one) => one.name === name && one.version === version) ?? null
}

/** Whether a band of this wavelength can serve; smaller is better, null where it cannot. */
export function bandDistance({ nm, toleranceNm }: NeededBand, wavelengthNm: number): number | null {
  for (const [at, one] of nm.entries()) {
    const away = Math.abs(one - wavelengthNm)
    if (away <= toleranceNm) return at * 100 + away
  }
  return null
}
