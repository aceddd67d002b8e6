export type ChlorophyllFeedKey = 'chl' | 'chlSecond' | 'chlLong'
export type ReflectanceBand = 443 | 490 | 510 | 555 | 670
export type FeedKey = ChlorophyllFeedKey | `rrs${ReflectanceBand}`

/** As a feed is created (the fields of shared/schemas/feeds.ts), with the key the scenario knows it by. */
export interface DemoFeed {
  key: FeedKey
  name: string
  quantity: 'chlorophyll' | 'reflectance'
  variable: string
  unit: 'mg m-3' | 'sr-1'
  scale: 'log10' | 'linear'
  cadence: 'daily'
  stage: 'near-real-time'
  processingVersion: string
  /** Fits every file of the feed; the date in it is needed only for pictures, which hold none. */
  fileNamePattern: string
}

export const reflectanceBands: ReflectanceBand[] = [443, 490, 510, 555, 670]

/** The version the long feed starts with, and the one that took over on `longFeedChange`. */
export const longFeedVersions = { before: 'R2022.0', after: 'R2026.0', factor: 1.35 }

function chlorophyll(key: ChlorophyllFeedKey, name: string, variable: string, fileNamePattern: string): DemoFeed {
  return {
    key, name, variable, fileNamePattern,
    quantity: 'chlorophyll', unit: 'mg m-3', scale: 'log10', cadence: 'daily', stage: 'near-real-time',
    processingVersion: longFeedVersions.before,
  }
}

function reflectance(band: ReflectanceBand): DemoFeed {
  return {
    key: `rrs${band}`, name: `Reflectance ${band} nm, daily, 4 km`, variable: `Rrs_${band}`,
    fileNamePattern: 'demo-rrs-{yyyy}{MM}{dd}*',
    quantity: 'reflectance', unit: 'sr-1', scale: 'linear', cadence: 'daily', stage: 'near-real-time',
    processingVersion: longFeedVersions.before,
  }
}

export const feeds: DemoFeed[] = [
  chlorophyll('chl', 'Chlorophyll, daily, 4 km', 'chlor_a', 'demo-chl-{yyyy}{MM}{dd}*'),
  chlorophyll('chlSecond', 'Chlorophyll, second sensor, 8 km', 'chlor_a_second', 'demo-second-{yyyy}{MM}{dd}*'),
  chlorophyll('chlLong', 'Chlorophyll, long record, 8 km', 'chlor_a_long', 'demo-long-{yyyy}{MM}{dd}*'),
  ...reflectanceBands.map(reflectance),
]
