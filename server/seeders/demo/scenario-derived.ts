import type { FeedKey } from './scenario-feeds'

/** A feed worked out from the reflectance bands, made through the same call an analyst makes. */
export interface DemoDerivedFeed {
  name: string
  from: FeedKey
  formula: string
  formulaVersion: string
}

/**
 * The screens that tell a bloom from its look-alikes. Chlorophyll from the bands is left for the analyst to make: it reads
 * its history in seconds, and would add these to every first start.
 */
export const derivedFeeds: DemoDerivedFeed[] = [
  { name: 'Bright water, daily, 4 km', from: 'rrs443', formula: 'bright-water', formulaVersion: '1' },
  { name: 'Turbid water, daily, 4 km', from: 'rrs670', formula: 'turbid-water', formulaVersion: '1' },
]
