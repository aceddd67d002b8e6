import { z } from 'zod'
import { day, id, instant, severity, version } from './common'
import { evidencePatch } from './patches'
import { bloomEvent, eventPhases } from './series'
import { shownView } from './regions'

export const alertStates = ['open', 'acknowledged', 'closed'] as const
export const alertState = z.enum(alertStates)

export const outcomes = ['confirmed by sample', 'confirmed by eye', 'not a bloom', 'undetermined'] as const
export const notBloomCauses = ['sediment', 'glint', 'cloud edge', 'other'] as const

/** What the alert rests on, as it was when it was judged: enough to compute it again. */
export const evidence = z.object({
  statistic: z.string(),
  unit: z.string().nullable(),
  value: z.number(),
  usual: z.number().nullable(),
  p10: z.number().nullable(),
  p90: z.number().nullable(),
  threshold: z.number().nullable(),
  timesUsual: z.number().nullable(),
  coverage: z.number(),
  coverageFloor: z.number(),
  wholeValid: z.number().int(),
  cells: z.number().int(),
  day,
  layerId: id,
  layerObservedAt: instant,
  fileId: id,
  fileName: z.string(),
  checksum: z.string(),
  processingVersion: z.string(),
  ruleId: id,
  ruleVersion: z.number().int(),
  ruleText: z.string(),
  baselineVersion: z.number().int().nullable(),
  baselineYears: z.array(z.number().int()),
  geometryVersion: z.number().int(),
  waterMask: z.string(),
  softwareVersion: z.string(),
  /** Formula, version and bands of a derived figure. */
  formula: z.string().nullable().optional(),
  /** The largest patch above the region's level; null where nothing reached it, left out in alerts of before. */
  largestPatch: evidencePatch.nullable().optional(),
})
export type Evidence = z.infer<typeof evidence>

export const entryKinds = [
  'raised', 'rose', 'ended', 'lost', 'resumed', 'rejudged', 'letter',
  'acknowledged', 'note', 'assigned', 'held', 'escalated', 'closed', 'reopened',
] as const

export const alertEntry = z.object({
  id,
  at: instant,
  kind: z.enum(entryKinds),
  by: z.string().nullable(),
  text: z.string(),
})
export type AlertEntry = z.infer<typeof alertEntry>

export const alertItem = z.object({
  id,
  regionId: id,
  regionName: z.string(),
  feedId: id,
  feedName: z.string(),
  state: alertState,
  phase: z.enum(eventPhases),
  severity,
  raisedAt: instant,
  triggerDay: day,
  /** The one-sentence statement: the first clause names the worry, the rest the facts. */
  statement: z.object({ lead: z.string(), rest: z.string() }),
  /** How it came about, in one sentence. */
  story: z.string(),
  evidence,
  /** The newest usable view of the region, which may be newer than the evidence. */
  latest: shownView.nullable(),
  /** The last 30 days, oldest first, for the small chart. */
  recent: z.array(
    z.object({ day, value: z.number().nullable(), p10: z.number().nullable(), p90: z.number().nullable(), flagged: z.boolean() }),
  ),
  acknowledgedBy: z.string().nullable(),
  acknowledgedAt: instant.nullable(),
  assignee: z.object({ id, name: z.string() }).nullable(),
  hold: z.object({ until: instant, reason: z.string() }).nullable(),
  outcome: z.enum(outcomes).nullable(),
  cause: z.enum(notBloomCauses).nullable(),
  closedAt: instant.nullable(),
  version,
})
export type AlertItem = z.infer<typeof alertItem>

export const alert = alertItem.extend({
  event: bloomEvent,
  cautions: z.array(z.string()),
  entries: z.array(alertEntry),
  /** Whom it can be given to. */
  assignable: z.array(z.object({ id, name: z.string() })),
})
export type Alert = z.infer<typeof alert>

export const explanation = z.object({
  agrees: z.boolean(),
  sentence: z.string(),
  stored: evidence,
  recomputed: z.object({
    value: z.number().nullable(),
    usual: z.number().nullable(),
    p10: z.number().nullable(),
    p90: z.number().nullable(),
    threshold: z.number().nullable(),
    timesUsual: z.number().nullable(),
    coverage: z.number().nullable(),
    checksum: z.string().nullable(),
  }),
  differences: z.array(z.string()),
})
export type Explanation = z.infer<typeof explanation>

const note = z.string().trim().max(4000)
export const acknowledgement = z.object({ note: note.default(''), version: version.optional() })
export const alertNote = z.object({ text: note.min(1, 'A note needs words.'), version: version.optional() })
export const assignment = z.object({ userId: id.nullable(), version: version.optional() })
export const hold = z.object({ until: instant, reason: note.min(1, 'Say why it is held.'), version: version.optional() })
export const closing = z
  .object({
    outcome: z.enum(outcomes),
    cause: z.enum(notBloomCauses).nullable().default(null),
    note: note.default(''),
    version: version.optional(),
  })
  .refine((c) => c.outcome !== 'not a bloom' || c.cause !== null, {
    message: 'Say what it was instead: sediment, glint, cloud edge or other.',
    path: ['cause'],
  })
export const reopening = z.object({ note: note.min(1, 'Say why it is reopened.'), version: version.optional() })

export const alertsQuery = z.object({
  state: alertState.optional(),
  severity: severity.optional(),
  regionId: z.coerce.number().int().positive().optional(),
})
