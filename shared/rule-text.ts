import { figureText, unitWords } from './figure-text'
import type { RuleDefinition, RuleTest } from './science/rule'

const statisticNames: Record<RuleDefinition['statistic'], string> = {
  median: 'Median',
  geometricMean: 'Geometric mean',
  mean: 'Mean',
  p90: 'Ninetieth percentile',
  departure: 'Departure',
}

/** A rule in one sentence, as letters and pages say it. */
export function ruleText(rule: RuleDefinition, unit: string | null): string {
  const views = rule.consecutiveViews === 1 ? 'one usable view' : `${rule.consecutiveViews} usable views in a row within ${rule.withinDays} days`
  const floor = `at least ${Math.round(rule.coverageFloor * 100)} % of the water and ${rule.minimumWholeCells} whole cells seen`
  return `${statisticNames[rule.statistic]} ${testText(rule.test, unit)}, on ${views}, with ${floor}.`
}

function testText(test: RuleTest, unit: string | null): string {
  switch (test.kind) {
    case 'above-level':
      return `above ${figureText(test.level)}${unit ? ` ${unitWords(unit)}` : ''}`
    case 'above-percentile':
      return `above the ${test.percentile}th percentile of the season`
    case 'times-usual':
      return test.atLeast === 2 ? 'at least twice usual' : `at least ${figureText(test.atLeast)} times usual`
    case 'all':
      return listed(test.of.map((part) => testText(part, unit)), 'and')
    case 'any':
      return listed(test.of.map((part) => testText(part, unit)), 'or')
  }
}

function listed(parts: string[], word: 'and' | 'or'): string {
  return parts.length < 2 ? (parts[0] ?? '') : `${parts.slice(0, -1).join(', ')} ${word} ${parts.at(-1)}`
}
