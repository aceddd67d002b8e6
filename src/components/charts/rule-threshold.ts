import { baselineDay } from '../../../shared/science/baseline'
import { judgeView } from '../../../shared/science/judge-view'
import type { RuleDefinition } from '../../../shared/science/rule'
import type { Baseline } from '../../../shared/schemas/series'
import type { Figures } from './series-days'

/**
 * The level from which a rule flags, by day of year (366 long), in the feed's unit: what the judge itself answers.
 * Null where the rule needs what is usual and too little is known of it.
 */
export function ruleThreshold(rule: RuleDefinition, baseline: Baseline | null): Figures {
  return Array.from({ length: 366 }, (_, slot) => {
    const usual = baseline ? baselineDay(baseline.columns, slot + 1) : null
    const view = { day: 0, observedAt: 0, coverage: 1, wholeValid: Infinity, statistics: { [rule.statistic]: NaN } }
    return judgeView(view, usual, rule).threshold
  })
}
