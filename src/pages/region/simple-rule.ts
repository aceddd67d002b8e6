import { z } from 'zod'
import type { RuleDefinition } from '../../api/rules'

/** The numbers of the simple rule, in the units a person types. */
export const ruleNumbers = z.object({
  absoluteFloor: z.number('Give a number.').nonnegative('A level cannot be below 0.'),
  timesUsual: z.number('Give a number.').positive('This must be above 0.'),
  coverageFloorPercent: z.number('Give a number.').min(0, 'At least 0 %.').max(100, 'At most 100 %.'),
  consecutiveViews: z.number('Give a number.').int('A whole number of views.').min(1, 'At least one view.').max(30, 'At most 30 views.'),
  withinDays: z.number('Give a number.').int('A whole number of days.').min(1, 'At least one day.').max(120, 'At most 120 days.'),
})
export type RuleNumbers = z.infer<typeof ruleNumbers>

type Part = { kind: 'above-level'; level: number } | { kind: 'times-usual'; atLeast: number }

/** The numbers of a rule of the simple shape (percentile, times usual and level together); undefined of any other. */
export function numbersOf(definition: RuleDefinition): RuleNumbers | undefined {
  const { test } = definition
  if (test.kind !== 'all' || test.of.length !== 3 || !test.of.some((part) => part.kind === 'above-percentile')) return undefined
  const level = test.of.find((part): part is Extract<Part, { kind: 'above-level' }> => part.kind === 'above-level')
  const times = test.of.find((part): part is Extract<Part, { kind: 'times-usual' }> => part.kind === 'times-usual')
  if (!level || !times) return undefined
  return {
    absoluteFloor: level.level,
    timesUsual: times.atLeast,
    coverageFloorPercent: Math.round(definition.coverageFloor * 1000) / 10,
    consecutiveViews: definition.consecutiveViews,
    withinDays: definition.withinDays,
  }
}

export function withNumbers(definition: RuleDefinition, numbers: RuleNumbers): RuleDefinition {
  const { test } = definition
  if (test.kind !== 'all') return definition
  const of = test.of.map((part) => {
    if (part.kind === 'above-level') return { ...part, level: numbers.absoluteFloor }
    if (part.kind === 'times-usual') return { ...part, atLeast: numbers.timesUsual }
    return part
  })
  return {
    ...definition,
    test: { ...test, of },
    coverageFloor: numbers.coverageFloorPercent / 100,
    consecutiveViews: numbers.consecutiveViews,
    withinDays: numbers.withinDays,
  }
}
