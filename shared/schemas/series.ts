import { z } from 'zod'
import { day, id, instant, severity } from './common'

const figures = z.array(z.number().nullable())

export const seriesColumns = {
  layerId: z.array(id),
  observedAt: z.array(instant),
  day: z.array(day),
  coverage: figures,
  cells: z.array(z.number().int()),
  valid: z.array(z.number().int()),
  validAreaKm2: figures,
  mean: figures,
  geometricMean: figures,
  median: figures,
  p10: figures,
  p25: figures,
  p75: figures,
  p90: figures,
  p95: figures,
  max: figures,
  maxLat: figures,
  maxLon: figures,
  sdLog10: figures,
  departure: figures,
  areaAboveKm2: figures,
}
export const seriesColumnNames = Object.keys(seriesColumns) as (keyof typeof seriesColumns)[]

export const seriesQuery = z.object({
  feedId: z.coerce.number().int().positive(),
  from: day.optional(),
  to: day.optional(),
  /** Names from the list, comma-separated; all when left out. */
  columns: z.string().max(400).optional(),
  /** The level of areaAboveKm2, in the feed's unit; the rule's absolute floor when left out. */
  above: z.coerce.number().positive().optional(),
  /** Adds `maskedByReason`. */
  masked: z.enum(['true', 'false']).optional(),
})

export const series = z.object({
  regionId: id,
  feedId: id,
  unit: z.string().nullable(),
  columns: z.object(seriesColumns).partial(),
  /** Water hidden in each view for each reason, km2, in the order of the columns; only where asked for. */
  maskedByReason: z.record(z.string(), z.array(z.number())).optional(),
})
export type Series = z.infer<typeof series>

export const baselineStatistics = ['median', 'geometricMean', 'mean', 'p90'] as const
export const baselineQuery = z.object({
  feedId: z.coerce.number().int().positive(),
  statistic: z.enum(baselineStatistics).optional(),
  halfWidthDays: z.coerce.number().int().min(0).max(60).optional(),
  smoothingDays: z.coerce.number().int().min(1).max(91).optional(),
  /** "2016-2025" or "2016,2018,2020-2022". */
  years: z.string().max(200).optional(),
})

export const baseline = z.object({
  regionId: id,
  feedId: id,
  version: z.number().int().nullable(),
  statistic: z.enum(baselineStatistics),
  years: z.array(z.number().int()),
  halfWidthDays: z.number().int(),
  smoothingDays: z.number().int(),
  columns: z.object({
    dayOfYear: z.array(z.number().int()),
    p10: figures,
    p25: figures,
    p50: figures,
    p75: figures,
    p90: figures,
    p95: figures,
    meanLog10: figures,
    sdLog10: figures,
    n: z.array(z.number().int()),
    years: z.array(z.number().int()),
  }),
})
export type Baseline = z.infer<typeof baseline>

export const eventPhases = ['running', 'ended', 'lost'] as const
export const bloomEvent = z.object({
  id,
  regionId: id,
  feedId: id,
  ruleId: id,
  ruleVersion: z.number().int(),
  phase: z.enum(eventPhases),
  lastUnflaggedBefore: day.nullable(),
  firstFlagged: day,
  lastFlagged: day,
  firstUnflaggedAfter: day.nullable(),
  triggerDay: day,
  peakDay: day,
  peakValue: z.number(),
  peakTimesUsual: z.number().nullable(),
  severity,
  usableViews: z.number().int(),
  /** Version of the outline it was found over. */
  geometryVersion: z.number().int(),
  /** Why it ended, where that was not what the water did. */
  endedBecause: z.string().nullable(),
  alertId: id.nullable(),
})
export type BloomEventItem = z.infer<typeof bloomEvent>

export const eventsQuery = z.object({
  feedId: z.coerce.number().int().positive().optional(),
  ruleId: z.coerce.number().int().positive().optional(),
})
