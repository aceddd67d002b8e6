import { z } from 'zod'
import { id, instant, version } from './common'
import { baselineStatistics } from './series'

const percentile = z.union([z.literal(10), z.literal(25), z.literal(50), z.literal(75), z.literal(90), z.literal(95)])

export type RuleTestShape =
  | { kind: 'above-level'; level: number }
  | { kind: 'above-percentile'; percentile: 10 | 25 | 50 | 75 | 90 | 95 }
  | { kind: 'times-usual'; atLeast: number }
  | { kind: 'all'; of: RuleTestShape[] }
  | { kind: 'any'; of: RuleTestShape[] }

export const ruleTest: z.ZodType<RuleTestShape> = z.lazy(() =>
  z.discriminatedUnion('kind', [
    z.object({ kind: z.literal('above-level'), level: z.number().nonnegative() }),
    z.object({ kind: z.literal('above-percentile'), percentile }),
    z.object({ kind: z.literal('times-usual'), atLeast: z.number().positive() }),
    z.object({ kind: z.literal('all'), of: z.array(ruleTest).min(1).max(8) }),
    z.object({ kind: z.literal('any'), of: z.array(ruleTest).min(1).max(8) }),
  ]),
)

export const ruleDefinition = z.object({
  statistic: z.enum(baselineStatistics),
  test: ruleTest,
  coverageFloor: z.number().min(0).max(1),
  minimumWholeCells: z.number().int().min(1).max(10_000),
  consecutiveViews: z.number().int().min(1).max(30),
  withinDays: z.number().int().min(1).max(120),
  joinGapDays: z.number().int().min(0).max(60),
  lostAfterDays: z.number().int().min(1).max(365),
  freshnessLimitDays: z.number().min(0).max(60),
  minimumYears: z.number().int().min(1).max(30),
  severitySteps: z
    .object({ moderate: z.number().positive(), severe: z.number().positive(), extreme: z.number().positive() })
    .refine((s) => s.moderate < s.severe && s.severe < s.extreme, 'The severity steps must rise.'),
})

export const newRule = z.object({
  feedId: id,
  name: z.string().trim().min(1).max(100),
  definition: ruleDefinition,
})
export const ruleChange = z.object({
  version,
  name: z.string().trim().min(1).max(100).optional(),
  definition: ruleDefinition.optional(),
})
export const ruleActivation = z.object({
  ruleVersion: z.number().int().positive(),
  note: z.string().trim().max(500).default(''),
})

export const ruleVersion = z.object({
  version: z.number().int(),
  definition: ruleDefinition,
  /** The rule in one sentence, as letters and the alert page say it. */
  text: z.string(),
  note: z.string(),
  createdAt: instant,
  createdBy: z.string().nullable(),
  activatedAt: instant.nullable(),
})

export const rule = z.object({
  id,
  regionId: id,
  feedId: id,
  name: z.string(),
  activeVersion: z.number().int().nullable(),
  versions: z.array(ruleVersion),
  version,
})
export type Rule = z.infer<typeof rule>
