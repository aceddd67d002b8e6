import { expect, test } from 'vitest'
import { defaultRule } from '../../../shared/science/rule'
import type { RuleDefinition } from '../../../src/api/rules'
import { numbersOf, ruleNumbers, withNumbers } from '../../../src/pages/region/simple-rule'

const rule = defaultRule() as RuleDefinition

test('the default rule shows its five numbers', () => {
  expect(numbersOf(rule)).toEqual({ absoluteFloor: 1, timesUsual: 2, coverageFloorPercent: 25, consecutiveViews: 2, withinDays: 10 })
})

test('changed numbers go back where they came from, and nothing else moves', () => {
  const changed = withNumbers(rule, { absoluteFloor: 1.5, timesUsual: 3, coverageFloorPercent: 40, consecutiveViews: 3, withinDays: 8 })
  expect(numbersOf(changed)).toEqual({ absoluteFloor: 1.5, timesUsual: 3, coverageFloorPercent: 40, consecutiveViews: 3, withinDays: 8 })
  expect({ ...changed, test: rule.test, coverageFloor: 0.25, consecutiveViews: 2, withinDays: 10 }).toEqual(rule)
})

test('a rule of another shape is left alone', () => {
  expect(numbersOf({ ...rule, test: { kind: 'above-level', level: 5 } })).toBeUndefined()
})

test('numbers that mean nothing are refused with a sentence', () => {
  const typed = { absoluteFloor: -1, timesUsual: 0, coverageFloorPercent: 120, consecutiveViews: 1.5, withinDays: NaN }
  const messages = ruleNumbers.safeParse(typed).error?.issues.map((issue) => issue.message)
  expect(messages).toEqual(['A level cannot be below 0.', 'This must be above 0.', 'At most 100 %.', 'A whole number of views.', 'Give a number.'])
})
