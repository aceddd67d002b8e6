import { figureText, unitWords } from '../../shared/figure-text'
import type { ShownLevel } from '../../shared/schemas/patches'
import type { RuleDefinition, RuleTest } from '../../shared/science/rule'
import type { Context } from '../context'

/** Where no rule names a level, in the feed's unit. */
export const plainLevel = 1

interface RuleInForce {
  name: string
  version: number
  definition: RuleDefinition
}

/** The first rule of a region and feed that is switched on. */
export async function definitionInForce(context: Context, regionId: number, feedId: number): Promise<RuleInForce | null> {
  const row = await context.db.first<{ name: string; version: number; definition: string }>(
    `SELECT r.name, v.version, v.definition FROM rules r JOIN rule_versions v ON v.rule_id = r.id AND v.version = r.active_version
     WHERE r.region_id = $regionId AND r.feed_id = $feedId ORDER BY r.id LIMIT 1`,
    { regionId, feedId },
  )
  return row ? { ...row, definition: JSON.parse(row.definition) as RuleDefinition } : null
}

/** The level a region is looked at with: the one asked for, else the floor its rule in force names, else 1 in the feed's unit. */
export function regionLevel(unit: string | null, rule: RuleInForce | null, asked?: number): ShownLevel {
  const text = (level: number) => levelText(level, unit)
  if (asked !== undefined) return { level: asked, from: 'asked', why: `${text(asked)}, the level asked for.` }
  const level = rule && levelOf(rule.definition.test)
  if (rule && level !== null) return { level, from: 'rule', why: `${text(level)}, the floor of the rule in force here (${rule.name}, version ${rule.version}).` }
  return { level: plainLevel, from: 'no rule', why: `${text(plainLevel)}, as no rule in force here names a level of this feed.` }
}

export const levelText = (level: number, unit: string | null): string => `${figureText(level)}${unit && unit !== '1' ? ` ${unitWords(unit)}` : ''}`

/** The level a test names; the first where it names several. */
export function levelOf(test: RuleTest): number | null {
  if (test.kind === 'above-level') return test.level
  if (test.kind === 'all' || test.kind === 'any') return test.of.map(levelOf).find((level) => level !== null) ?? null
  return null
}
