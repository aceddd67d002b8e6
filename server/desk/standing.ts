import { ageText } from '../../shared/figure-text'
import { fewestWholeCells } from '../../shared/science/whole-water'
import { dateOf } from '../../shared/science/local-day'
import { regionStates, severities, type RegionStateName } from '../../shared/schemas/common'
import type { HistoryState, RegionStanding } from '../../shared/schemas/regions'
import type { Context } from '../context'
import { regionFacts, seenDays, type RegionFacts, type SeenDay } from '../queries/region-facts'

const hourMs = 3_600_000
const dayMs = 24 * hourMs
const shownDays = 14
/** A view this old while newer layers came in was not renewed by them. Two days, since a date alone counts from midnight. */
const notSeenAfterHours: Record<string, number> = { daily: 48, '8-day': 24 * 12, monthly: 24 * 46 }

/** Where every region stands, by region id. */
export async function standings(context: Context, regionId?: number): Promise<Map<number, RegionStanding>> {
  const now = context.clock.now()
  const facts = await regionFacts(context, regionId)
  const today = Math.floor(now / dayMs)
  const seen = await seenDays(context, today - shownDays + 1, facts)
  return new Map(facts.map((fact) => [fact.regionId, standingOf(fact, seen.filter((day) => day.regionId === fact.regionId), now)]))
}

export function standingOf(facts: RegionFacts, seen: readonly SeenDay[], now: number): RegionStanding {
  const { state, because } = stateOf(facts, now)
  const { judged } = facts
  const coverageOf = new Map(seen.map((day) => [day.day, day.coverage]))
  const today = Math.floor(now / dayMs)
  const hasView = judged !== null && judged.day !== null && judged.layerId !== null && judged.observedAt !== null && judged.coverage !== null
  return {
    state,
    because,
    feedId: facts.feedId,
    ruleId: facts.ruleId,
    unit: facts.unit,
    severity: state === 'unusual' ? (judged?.severity ?? facts.alertSeverity) : null,
    alertId: facts.alertId,
    view: !hasView
      ? null
      : {
          layerId: judged.layerId!,
          day: dateOf(judged.day!),
          observedAt: new Date(judged.observedAt!).toISOString(),
          ageHours: (now - judged.observedAt!) / hourMs,
          coverage: judged.coverage!,
          value: judged.value,
          usual: judged.usual,
          p10: judged.p10,
          p90: judged.p90,
          timesUsual: judged.timesUsual,
        },
    seen: Array.from({ length: shownDays }, (_, i) => {
      const day = today - shownDays + 1 + i
      return { day: dateOf(day), coverage: coverageOf.get(day) ?? null }
    }),
    coverageFloor: facts.definition?.coverageFloor ?? 0.25,
    progress: facts.jobState === null ? null : { state: facts.jobState, done: facts.jobDone ?? 0, total: facts.jobTotal ?? 0 },
  }
}

const historyText: Record<HistoryState, string> = {
  waiting: 'Its history is being read.',
  running: 'Its history is being read.',
  paused: 'The reading of its history is paused.',
  cancelled: 'The reading of its history was stopped before its end.',
  failed: 'The reading of its history failed. What was read is kept.',
}

const feedHistoryText: Record<HistoryState, string> = {
  waiting: 'being made anew',
  running: 'being made anew',
  paused: 'half made anew, and paused',
  cancelled: 'half made anew, and stopped',
  failed: 'half made anew, and failed',
}

function stateOf(facts: RegionFacts, now: number): { state: RegionStateName; because: string } {
  const { judged } = facts
  if (facts.jobState !== null) return { state: 'not ready', because: historyText[facts.jobState] }
  if (facts.feedId === null) return { state: 'not ready', because: 'No feed has seen this water yet.' }
  if (facts.ruleId === null || judged === null) return { state: 'not ready', because: 'It has not been judged yet.' }
  if (judged.inEvent) return { state: 'unusual', because: 'Its newest usable views meet the rule.' }
  if (facts.feedJobState !== null) return { state: 'not ready', because: `The history of ${facts.feedName} is ${feedHistoryText[facts.feedJobState]}.` }
  const layerAge = facts.newestLayerAt === null ? null : (now - facts.newestLayerAt) / hourMs
  if (layerAge === null) return { state: 'stale', because: `${facts.feedName} has sent no layer.` }
  if (layerAge > facts.silentAfterHours!) return { state: 'stale', because: `${facts.feedName} has been silent for ${ageText(layerAge)}.` }
  if (isTooSmall(facts)) return { state: 'not ready', because: tooSmallText(facts) }
  if (judged.observedAt === null) return { state: 'not seen', because: 'No view has reached the coverage floor yet.' }
  const viewAge = (now - judged.observedAt) / hourMs
  const newerLayers = facts.newestLayerAt !== null && facts.newestLayerAt > judged.observedAt
  if (newerLayers && viewAge > (notSeenAfterHours[facts.cadence ?? 'daily'] ?? 48)) return { state: 'not seen', because: `Last seen well enough ${ageText(viewAge)} ago.` }
  if (judged.state === 'not-comparable') return { state: 'not comparable', because: 'The processing version changed, and has no earlier years of its own.' }
  if (facts.gapFilled) return { state: 'not ready', because: `${facts.feedName} is gap-filled, and its files do not say which cells were seen: it cannot raise alerts.` }
  if (judged.state === 'not-ready') return { state: 'not ready', because: 'There are too few earlier years to say what is usual.' }
  if (judged.state === 'flagged') {
    return { state: 'usual', because: 'One view is above the rule; the rule asks for more before it calls the water unusual.' }
  }
  return { state: 'usual', because: 'Its newest usable view does not meet the rule.' }
}

/** Too few whole water cells for percentiles, and no rule of somebody's own that does without. */
function isTooSmall({ wholeWater, definition }: RegionFacts): boolean {
  if (wholeWater === null || wholeWater >= fewestWholeCells || definition === null) return false
  const doesWithout = definition.minimumWholeCells <= wholeWater && (definition.statistic === 'mean' || definition.statistic === 'geometricMean')
  return !doesWithout
}

function tooSmallText({ wholeWater, feedName }: RegionFacts): string {
  const holds = wholeWater === 0 ? 'no whole water cell' : wholeWater === 1 ? 'one whole water cell' : `${wholeWater} whole water cells`
  return `It is too small for the cells of ${feedName}: it holds ${holds}, and ${fewestWholeCells} are needed to say what is usual.`
}

/** The order of worry: state, severity, then times usual; the longest unseen first among those not seen. */
export function byWorry<T extends { standing: RegionStanding; name: string }>(a: T, b: T): number {
  const rank = (standing: RegionStanding) => regionStates.indexOf(standing.state)
  const severity = (standing: RegionStanding) => (standing.severity ? severities.indexOf(standing.severity) : -1)
  return (
    rank(a.standing) - rank(b.standing) ||
    severity(b.standing) - severity(a.standing) ||
    (a.standing.state === 'not seen' ? (b.standing.view?.ageHours ?? Infinity) - (a.standing.view?.ageHours ?? Infinity) || 0 : 0) ||
    (b.standing.view?.timesUsual ?? 0) - (a.standing.view?.timesUsual ?? 0) ||
    a.name.localeCompare(b.name)
  )
}
