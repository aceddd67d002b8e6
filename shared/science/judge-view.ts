import type { BaselineDay } from './baseline'
import type { JudgeableView, JudgedView, RuleDefinition, RuleTest, ViewState } from './rule'
import { needsBaseline } from './rule'

/** What a test is asked about: the figures of one view and what is usual that day. */
interface Evidence {
  value: number
  /** The quantity itself, for levels: the value, but the geometric mean for departures; null when that is missing. */
  level: number | null
  isDeparture: boolean
  usual: number | null
  baseline: BaselineDay | null
}

interface Answer {
  met: boolean
  /** The value at which this test turns; null when it hangs on another figure. */
  threshold: number | null
}

/** Null: a number that the test needs is missing. */
function ask(test: RuleTest, evidence: Evidence): Answer | null {
  const { value, level, isDeparture, usual, baseline } = evidence
  switch (test.kind) {
    case 'above-level':
      return level === null ? null : { met: level > test.level, threshold: isDeparture ? null : test.level }
    case 'above-percentile': {
      const threshold = baseline?.[`p${test.percentile}`] ?? null
      return threshold === null ? null : { met: value > threshold, threshold }
    }
    case 'times-usual': {
      if (usual === null) return null
      const threshold = isDeparture ? Math.log10(test.atLeast) : usual * test.atLeast
      return !isDeparture && usual <= 0 ? null : { met: value >= threshold, threshold }
    }
    case 'all':
    case 'any': {
      const answers = test.of.map((part) => ask(part, evidence))
      if (answers.length === 0 || answers.includes(null)) return null
      return together(answers.filter((answer) => answer !== null), test.kind)
    }
  }
}

function together(answers: Answer[], kind: 'all' | 'any'): Answer {
  const thresholds = answers.flatMap(({ threshold }) => (threshold === null ? [] : [threshold]))
  const turn = kind === 'all' ? Math.max(...thresholds) : Math.min(...thresholds)
  return {
    met: kind === 'all' ? answers.every(({ met }) => met) : answers.some(({ met }) => met),
    threshold: thresholds.length === 0 ? null : turn,
  }
}

/** Enough of the region was seen for a rule to say anything. */
export function isUsable(view: JudgeableView, rule: RuleDefinition): boolean {
  return (
    view.coverage !== null &&
    view.coverage >= rule.coverageFloor &&
    view.wholeValid >= rule.minimumWholeCells &&
    Number.isFinite(view.statistics[rule.statistic] ?? NaN)
  )
}

/**
 * Judges one view. 'not-seen': coverage or whole cells below the rule's floor, or no value. 'not-ready': the rule looks
 * at what is usual, and the baseline of that day is missing, rests on fewer than `minimumYears`, or lacks a number the
 * test needs (even where another part would already decide: a region without a baseline is never called usual).
 * `baseline` is that of the rule's statistic on the view's date.
 */
export function judgeView(view: JudgeableView, baseline: BaselineDay | null, rule: RuleDefinition): JudgedView {
  const isDeparture = rule.statistic === 'departure'
  const value = view.statistics[rule.statistic] ?? null
  const known = baseline !== null && baseline.years >= rule.minimumYears ? baseline : null
  const usual = known === null || known.p50 === null ? null : isDeparture ? 0 : known.p50
  const level = isDeparture ? (view.statistics.geometricMean ?? null) : (value ?? NaN)
  const evidence = { value: value ?? NaN, level, isDeparture, usual, baseline: known }
  const answer = known === null && needsBaseline(rule.test) ? null : ask(rule.test, evidence)
  return {
    day: view.day,
    state: isUsable(view, rule) ? stateOf(answer) : 'not-seen',
    value,
    usual,
    p10: known?.p10 ?? null,
    p90: known?.p90 ?? null,
    threshold: answer?.threshold ?? null,
    timesUsual: timesUsual(value, usual, isDeparture),
  }
}

function stateOf(answer: Answer | null): ViewState {
  if (answer === null) return 'not-ready'
  return answer.met ? 'flagged' : 'unflagged'
}

function timesUsual(value: number | null, usual: number | null, isDeparture: boolean): number | null {
  if (value === null || !Number.isFinite(value)) return null
  if (isDeparture) return 10 ** value
  return usual !== null && usual > 0 ? value / usual : null
}
