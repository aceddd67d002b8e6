import { z } from 'zod'
import { id, instant, version } from './common'

export const quantities = ['chlorophyll', 'reflectance', 'other'] as const
export const stages = ['near-real-time', 'reprocessed'] as const
export const cadences = ['daily', '8-day', 'monthly'] as const
/** Hours without a layer after which a feed of that cadence is usually silent. */
export const usualSilence = { daily: 72, '8-day': 24 * 20, monthly: 24 * 70 } as const

const text = (max: number) => z.string().trim().min(1).max(max)

const flagNames = z.array(text(100)).max(200)

export const feedFields = z.object({
  name: text(100),
  quantity: z.enum(quantities),
  variable: text(200),
  unit: text(50).nullable(),
  /** log10: merged and averaged in log space, as suits chlorophyll. */
  scale: z.enum(['log10', 'linear']),
  cadence: z.enum(cadences).default('daily'),
  stage: z.enum(stages).default('near-real-time'),
  processingVersion: text(50).default('1'),
  validMin: z.number().nullable().default(null),
  validMax: z.number().nullable().default(null),
  /** A file-name pattern: {yyyy} {MM} {dd} {DDD} {HH} {mm} are parts of the date, * is anything. */
  fileNamePattern: text(200).nullable().default(null),
  /** Views older than this when they arrive raise no letter at once. */
  freshnessLimitHours: z.number().min(1).max(24 * 60).default(72),
  /** No layer for this long: the feed is silent. */
  silentAfterHours: z.number().min(1).max(24 * 120).default(72),
  /** Flag meanings, as the file spells them, that hide a cell. */
  hiddenFlags: flagNames.default([]),
  /** All flag meanings found in its files. */
  flagMeanings: flagNames.default([]),
  /** Cells may have been filled in, and the files don't say which: such a feed raises no alert. */
  gapFilled: z.boolean().default(false),
  /** The numbers are base-10 logarithms; counts where the file does not say so itself. */
  storedLog10: z.boolean().default(false),
  /** The unit of the file's numbers; counts where the file names none. */
  fileUnit: text(50).nullable().default(null),
})

/** What the formula of a derived feed says by itself. */
const saidByFormula = { quantity: true, variable: true, unit: true, scale: true } as const
const derivation = z.object({
  /** The feed of one reflectance band; the other bands come from the same files, or from `derivedSources`. */
  derivedFrom: id.optional(),
  derivedSources: z.array(id).max(20).optional(),
  formula: text(100).optional(),
  formulaVersion: text(50).optional(),
})

/** A feed as proposed; or a derived one: `derivedFrom`, `formula` and `formulaVersion`, the rest follows from these. */
export const newFeed = feedFields
  .partial(saidByFormula)
  .extend({ fileId: id.optional(), ...derivation.shape })
  .superRefine((feed, context) => {
    const say = (field: string, message: string) => context.addIssue({ code: 'custom', path: [field], message })
    const derived = feed.derivedFrom !== undefined
    for (const field of derived ? (['formula', 'formulaVersion'] as const) : (['quantity', 'variable', 'scale', 'unit'] as const)) {
      if (feed[field] === undefined) say(field, derived ? 'A derived feed needs it.' : 'A feed needs it.')
    }
    for (const field of ['formula', 'formulaVersion', 'derivedSources'] as const) {
      if (!derived && feed[field] !== undefined) say(field, 'Only a derived feed has it: say derivedFrom.')
    }
  })
export type NewFeed = z.infer<typeof newFeed>
export const feedProposal = feedFields
export type FeedProposal = z.infer<typeof feedProposal>
/** Feeds confirmed together from one waiting file. */
export const feedsOfFile = z.object({ feeds: z.array(feedFields).min(1, 'Choose at least one feed.').max(60) })

export const feedChange = z.object({
  version,
  name: text(100).optional(),
  cadence: z.enum(cadences).optional(),
  stage: z.enum(stages).optional(),
  processingVersion: text(50).optional(),
  validMin: z.number().nullable().optional(),
  validMax: z.number().nullable().optional(),
  fileNamePattern: text(200).nullable().optional(),
  freshnessLimitHours: z.number().min(1).max(24 * 60).optional(),
  silentAfterHours: z.number().min(1).max(24 * 120).optional(),
  hiddenFlags: flagNames.optional(),
  gapFilled: z.boolean().optional(),
  storedLog10: z.boolean().optional(),
  fileUnit: text(50).nullable().optional(),
  retired: z.boolean().optional(),
})

export const feed = feedFields.extend({
  id,
  derivedFrom: id.nullable(),
  /** Feeds whose layers a derived feed is made of, `derivedFrom` among them; empty for any other. */
  derivedSources: z.array(id),
  formula: z.string().nullable(),
  formulaVersion: z.string().nullable(),
  retired: z.boolean(),
  createdAt: instant,
  version,
  layers: z.number().int(),
  oldestLayerAt: instant.nullable(),
  newestLayerAt: instant.nullable(),
  newestAgeHours: z.number().nullable(),
  silent: z.boolean(),
})
export type Feed = z.infer<typeof feed>
