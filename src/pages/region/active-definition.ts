import type { Rule } from '../../../shared/schemas/rules'

/** The rule in force over a feed; undefined where nothing is judged. */
export function activeDefinition(rules: readonly Rule[], feedId: number) {
  const rule = rules.find((one) => one.feedId === feedId && one.activeVersion !== null)
  return rule?.versions.find((one) => one.version === rule.activeVersion)?.definition
}
