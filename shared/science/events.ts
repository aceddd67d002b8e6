import type { EpochDay } from './local-day'
import type { JudgedView, RuleDefinition } from './rule'

export type EventPhase = 'running' | 'ended' | 'lost'
export type Severity = 'Minor' | 'Moderate' | 'Severe' | 'Extreme'

/** A run of usable views that meets a rule. It began after `lastUnflaggedBefore` and by `firstFlagged`. */
export interface BloomEvent {
  phase: EventPhase
  /** The usable view just before, if it was unflagged; null when nothing, or only a lost event, came before. */
  lastUnflaggedBefore: EpochDay | null
  firstFlagged: EpochDay
  lastFlagged: EpochDay
  /** The first usable view after it, if unflagged. */
  firstUnflaggedAfter: EpochDay | null
  /** The day on which the run first met the rule. */
  triggerDay: EpochDay
  peakDay: EpochDay
  peakValue: number
  peakTimesUsual: number | null
  severity: Severity
  /** From first to last flagged, those of joined gaps included. */
  usableViews: number
  flaggedViews: number
}

/** Places first..last in the list of usable views; `trigger` is where the run met the rule. */
interface Run {
  first: number
  last: number
  trigger: number | null
}

/** Times usual at the peak in words; without a usual value nothing more than Minor is said. */
export function severityOf(timesUsual: number | null, steps: RuleDefinition['severitySteps']): Severity {
  if (timesUsual === null || timesUsual < steps.moderate) return 'Minor'
  if (timesUsual < steps.severe) return 'Moderate'
  return timesUsual < steps.extreme ? 'Severe' : 'Extreme'
}

/** Flagged views in a row; an unflagged view ends a row, and so does a time out of view that is too long. */
function runsOf(usable: readonly JudgedView[], rule: RuleDefinition): Run[] {
  const runs: Run[] = []
  let run: Run | null = null
  for (const [i, view] of usable.entries()) {
    if (view.state !== 'flagged') {
      run = null
      continue
    }
    if (run === null || view.day - usable[i - 1]!.day > rule.lostAfterDays) {
      run = { first: i, last: i, trigger: null }
      runs.push(run)
    }
    run.last = i
    const earliest = i - rule.consecutiveViews + 1
    const inRow = earliest >= run.first && view.day - usable[earliest]!.day <= rule.withinDays
    if (run.trigger === null && inRow) run.trigger = i
  }
  return runs
}

function joined(runs: readonly Run[], usable: readonly JudgedView[], rule: RuleDefinition): Run[] {
  const events: Run[] = []
  for (const run of runs) {
    const before = events.at(-1)
    const gap = before ? usable[run.first]!.day - usable[before.last]!.day - 1 : Infinity
    if (before && gap <= Math.min(rule.joinGapDays, rule.lostAfterDays - 1)) before.last = run.last
    else events.push({ ...run })
  }
  return events
}

function phaseOf(last: JudgedView, next: JudgedView | undefined, rule: RuleDefinition, today: EpochDay): EventPhase {
  if ((next?.day ?? today) - last.day > rule.lostAfterDays) return 'lost'
  return next ? 'ended' : 'running'
}

function eventOf(run: Run, usable: readonly JudgedView[], rule: RuleDefinition, today: EpochDay): BloomEvent {
  const views = usable.slice(run.first, run.last + 1)
  const flagged = views.filter((view) => view.state === 'flagged')
  const peak = flagged.reduce((best, view) => ((view.value ?? -Infinity) > (best.value ?? -Infinity) ? view : best))
  const before = usable[run.first - 1]
  const next = usable[run.last + 1]
  const last = usable[run.last]!
  return {
    phase: phaseOf(last, next, rule, today),
    lastUnflaggedBefore: before?.state === 'unflagged' ? before.day : null,
    firstFlagged: usable[run.first]!.day,
    lastFlagged: last.day,
    firstUnflaggedAfter: next?.state === 'unflagged' ? next.day : null,
    triggerDay: usable[run.trigger!]!.day,
    peakDay: peak.day,
    peakValue: peak.value ?? NaN,
    peakTimesUsual: peak.timesUsual,
    severity: severityOf(peak.timesUsual, rule.severitySteps),
    usableViews: views.length,
    flaggedViews: flagged.length,
  }
}

/**
 * The events of one region and feed, oldest first: a pure fold of judged views (one a day, any order) as of `today`;
 * later views are not looked at. Views not seen or not ready neither start nor end anything. A run of flagged views
 * is an event once `consecutiveViews` of them follow each other within `withinDays`. It ends at the first unflagged
 * view, and is joined with the next event if at most `joinGapDays` lie between; each must qualify alone. After more
 * than `lostAfterDays` without a usable view it is lost, and stays so whatever is seen later.
 * Source of the joining rule: Hobday et al. 2016, Prog. Oceanogr. 141:227-238.
 */
export function foldEvents(judged: readonly JudgedView[], rule: RuleDefinition, today: EpochDay): BloomEvent[] {
  const usable = judged
    .filter((view) => view.day <= today && (view.state === 'flagged' || view.state === 'unflagged'))
    .sort((a, b) => a.day - b.day || (a.value ?? 0) - (b.value ?? 0))
  const qualified = runsOf(usable, rule).filter((run) => run.trigger !== null)
  return joined(qualified, usable, rule).map((run) => eventOf(run, usable, rule, today))
}
