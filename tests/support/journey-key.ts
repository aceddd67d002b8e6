import type { BloomEventItem } from '../../shared/schemas/series'
import { answerKey, lookAlikes, type KeyedPeriod } from '../../server/seeders/demo/answer-key'
import { epochDay, isoDay } from '../../server/seeders/demo/days'
import { regionOf, regions, scenarioDays, type RegionKey } from '../../server/seeders/demo/scenario'
import { defaultRule } from '../../shared/science/rule'

export type EventSpan = Pick<BloomEventItem, 'firstFlagged' | 'lastFlagged'>

type FalseCause = 'river plume' | 'quiet region, often half seen' | 'nothing known'

export interface Score {
  hits: KeyedPeriod[]
  misses: KeyedPeriod[]
  /** Events that overlap nothing in the key of their region, with what they were taken in by. */
  falseAlarms: { region: RegionKey; event: EventSpan; cause: FalseCause }[]
  events: number
}

export interface Truth {
  key: KeyedPeriod[]
  plumes: KeyedPeriod[]
}

/** Worked out from the scenario; takes seconds. */
export function wholeTruth(): Truth {
  return { key: answerKey(), plumes: lookAlikes() }
}

/** How the events of one region stand against what was truly unusual there; a single shared day is a hit. */
export function scoreRegion(region: RegionKey, events: readonly EventSpan[], truth: Truth): Score {
  const here = ({ region: named }: KeyedPeriod) => named === region
  const key = truth.key.filter(here)
  const plumes = truth.plumes.filter(here)
  const meets = ({ from, to }: KeyedPeriod, { firstFlagged, lastFlagged }: EventSpan) =>
    epochDay(firstFlagged) <= to && epochDay(lastFlagged) >= from
  return {
    events: events.length,
    hits: key.filter((period) => events.some((event) => meets(period, event))),
    misses: key.filter((period) => !events.some((event) => meets(period, event))),
    falseAlarms: events
      .filter((event) => !key.some((period) => meets(period, event)))
      .map((event) => ({ region, event, cause: plumes.some((plume) => meets(plume, event)) ? 'river plume' : otherCause(region) })),
  }
}

/** Hallin Bank lies across a strong gradient under ragged cloud: which half is seen moves its figure. */
function otherCause(region: RegionKey): FalseCause {
  return region === 'hallin' ? 'quiet region, often half seen' : 'nothing known'
}

/** Before this many years of its feed no rule could say what is usual. */
export function isTooEarly({ region, to }: KeyedPeriod): boolean {
  const first = regionOf(region).feed === 'chl' ? scenarioDays.first : scenarioDays.firstOfSecondFeeds
  return to < first + Math.round(defaultRule().minimumYears * 365.25)
}

export function sumOf(scores: readonly Score[]): Score {
  return {
    events: scores.reduce((sum, { events }) => sum + events, 0),
    hits: scores.flatMap(({ hits }) => hits),
    misses: scores.flatMap(({ misses }) => misses),
    falseAlarms: scores.flatMap(({ falseAlarms }) => falseAlarms),
  }
}

/** Probability of detection: the share of the key that was found. */
export const podOf = ({ hits, misses }: Pick<Score, 'hits' | 'misses'>): number => hits.length / (hits.length + misses.length)

/** False alarm ratio: the share of events that were none. */
export const farOf = ({ falseAlarms, events }: Pick<Score, 'falseAlarms' | 'events'>): number => falseAlarms.length / events

/** The score as a table for people, then what was missed and what fired for nothing. */
export function scoreTable(scores: ReadonlyMap<RegionKey, Score>): string {
  const total = sumOf([...scores.values()])
  const row = (cells: (string | number)[]) => cells.map((cell, at) => (at === 0 ? String(cell).padEnd(16) : String(cell).padStart(8))).join('')
  const rowOf = (name: string, score: Score) =>
    row([name, score.hits.length + score.misses.length, score.events, score.hits.length, score.misses.length, score.falseAlarms.length, share(podOf(score)), share(farOf(score))])
  const causes = ['bloom', 'chalky bloom'] as const
  return [
    row(['region', 'key', 'events', 'hits', 'misses', 'false', 'POD', 'FAR']),
    ...regions.map(({ key, name }) => rowOf(name, scores.get(key) ?? sumOf([]))),
    rowOf('all', total),
    ...causes.map((cause) => {
      const of = (periods: KeyedPeriod[]) => periods.filter((period) => period.cause === cause)
      const found = { hits: of(total.hits), misses: of(total.misses) }
      return row([cause, found.hits.length + found.misses.length, '', found.hits.length, found.misses.length, '', share(podOf(found))])
    }),
    ...(['river plume', 'quiet region, often half seen', 'nothing known'] as const).map(
      (cause) => `false alarms, ${cause}: ${total.falseAlarms.filter((alarm) => alarm.cause === cause).length}`,
    ),
    `misses before there were ${defaultRule().minimumYears} earlier years: ${total.misses.filter(isTooEarly).length}`,
    ...total.misses.map((miss) => `missed: ${missWords(miss)}`),
    ...total.falseAlarms.map(({ region, event, cause }) => `false alarm: ${region} ${event.firstFlagged} to ${event.lastFlagged}, ${cause}`),
  ].join('\n')
}

function missWords(miss: KeyedPeriod): string {
  const { region, from, to, cause, timesUsual } = miss
  const times = timesUsual === null ? '' : `, ${timesUsual.toFixed(1)} times usual`
  return `${region} ${isoDay(from)} to ${isoDay(to)}, ${cause}${times}${isTooEarly(miss) ? ', too early' : ''}`
}

const share = (value: number): string => (Number.isNaN(value) ? '' : value.toFixed(2))
