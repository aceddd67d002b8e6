import type { EpochDay } from './local-day'

export const ruleStatistics = ['median', 'geometricMean', 'mean', 'p90', 'departure'] as const
export type RuleStatistic = (typeof ruleStatistics)[number]
export type RulePercentile = 10 | 25 | 50 | 75 | 90 | 95

/**
 * When a value is unusual. `above-level` and `above-percentile` are strict, `times-usual` takes "at least". With the
 * departure statistic `above-level` still means a level of the quantity and looks at the view's geometric mean.
 */
export type RuleTest =
  | { kind: 'above-level'; level: number }
  | { kind: 'above-percentile'; percentile: RulePercentile }
  | { kind: 'times-usual'; atLeast: number }
  | { kind: 'all'; of: RuleTest[] }
  | { kind: 'any'; of: RuleTest[] }

export interface RuleDefinition {
  statistic: RuleStatistic
  test: RuleTest
  /** A view with less coverage, or fewer whole cells seen, counts as not seen. */
  coverageFloor: number
  minimumWholeCells: number
  /** This many flagged usable views in a row, the last at most `withinDays` after the first, make an event. */
  consecutiveViews: number
  withinDays: number
  /** Two events with at most this many days between them are one. */
  joinGapDays: number
  /** Without a usable view for longer than this an event is lost from view. */
  lostAfterDays: number
  /** Only views newer than this raise letters at once. */
  freshnessLimitDays: number
  /** Years a date's baseline must rest on. */
  minimumYears: number
  /** Times usual at the peak from which each word holds; below `moderate` it is Minor. These are Offing's own steps. */
  severitySteps: { moderate: number; severe: number; extreme: number }
}

/** What a rule looks at in a view; null where the view has no such figure. */
export interface JudgeableView {
  day: EpochDay
  /** Instant, UTC milliseconds. */
  observedAt: number
  /** 0..1; null without water. */
  coverage: number | null
  wholeValid: number
  statistics: Partial<Record<RuleStatistic, number | null>>
}

export type ViewState = 'flagged' | 'unflagged' | 'not-seen' | 'not-ready'

export interface JudgedView {
  day: EpochDay
  state: ViewState
  /** The rule's statistic in this view. */
  value: number | null
  /** What is usual that day: the baseline's median; 0 for the departure statistic. */
  usual: number | null
  p10: number | null
  p90: number | null
  /** The lowest value that flags (strictly above it, or from it on, as the test that decides says). */
  threshold: number | null
  timesUsual: number | null
}

/** Offing's rule of departure: median above the seasonal 90th percentile, at least twice usual, above a floor. */
export function defaultRule({ absoluteFloor = 1 }: { absoluteFloor?: number } = {}): RuleDefinition {
  return {
    statistic: 'median',
    test: {
      kind: 'all',
      of: [
        { kind: 'above-percentile', percentile: 90 },
        { kind: 'times-usual', atLeast: 2 },
        { kind: 'above-level', level: absoluteFloor },
      ],
    },
    coverageFloor: 0.25,
    minimumWholeCells: 5,
    consecutiveViews: 2,
    withinDays: 10,
    joinGapDays: 2,
    lostAfterDays: 14,
    freshnessLimitDays: 3,
    minimumYears: 2,
    severitySteps: { moderate: 3, severe: 5, extreme: 8 },
  }
}

/** Whether a test compares with what is usual, and so needs a baseline. */
export function needsBaseline(test: RuleTest): boolean {
  if (test.kind === 'all' || test.kind === 'any') return test.of.some(needsBaseline)
  return test.kind !== 'above-level'
}
