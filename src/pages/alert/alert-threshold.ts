import type { Rule } from '../../../shared/schemas/rules'
import type { Baseline, BloomEventItem } from '../../../shared/schemas/series'
import { ruleThreshold } from '../../components/charts/rule-threshold'

/** The level of the very rule version the event was judged by, day by day of the year; null where it is not known. */
export function alertThreshold(
  rules: readonly Rule[] | undefined,
  event: BloomEventItem,
  baseline: Baseline | null,
): (number | null)[] | null {
  const version = rules?.find((rule) => rule.id === event.ruleId)?.versions.find((found) => found.version === event.ruleVersion)
  return version ? ruleThreshold(version.definition, baseline) : null
}
