import { z } from 'zod'
import { day, id, instant } from './common'
import { patchChangeKinds } from '../science/patch-changes'

const place = z.object({ latitude: z.number(), longitude: z.number() })

/** Geodesic from one place to another; no bearing where they are the same. */
export const away = z.object({ km: z.number(), bearing: z.number().nullable() })

/** A level may be 0 or less where the quantity may; an empty one is none. */
const level = z.preprocess((value) => (value === '' ? undefined : value), z.coerce.number('A level is a number.').optional())

export const patchesQuery = z.object({
  feedId: z.coerce.number().int().positive(),
  /** A day of a view; the newest view when left out. */
  day: day.optional(),
  /** In the feed's unit; the region's level when left out. */
  level,
  /** Patches of fewer cells are left out of the list. */
  minimumCells: z.coerce.number().int().min(1).max(10_000).default(1),
})

export const levelSources = ['asked', 'rule', 'no rule'] as const
export const shownLevel = z.object({
  level: z.number(),
  from: z.enum(levelSources),
  /** Which level it is and why, in one sentence. */
  why: z.string(),
})
export type ShownLevel = z.infer<typeof shownLevel>

export const patchChange = z.object({
  kind: z.enum(patchChangeKinds),
  /** Numbers of the patches that came of the same water. */
  together: z.array(z.number().int().positive()),
  /** Area of all it came of, and how much larger they are together now. */
  beforeKm2: z.number(),
  changeKm2: z.number(),
  /** Way of their middle. */
  moved: away.nullable(),
})
export type PatchChange = z.infer<typeof patchChange>

export const patch = z.object({
  /** From 1, the largest. */
  number: z.number().int().positive(),
  areaKm2: z.number(),
  /** It touches the edge of the region or water that was not seen: there may be more of it. */
  atLeast: z.boolean(),
  touchesEdge: z.boolean(),
  touchesUnseen: z.boolean(),
  cells: z.number().int().positive(),
  greatest: z.number(),
  peak: place,
  centre: place,
  /** From the site to the middle of the nearest cell, 0 km where the site lies in the patch; to the greatest value. */
  nearest: away.nullable(),
  peakAway: away.nullable(),
  change: patchChange.nullable(),
  /** Along the edges of its cells, longitudes unwrapped. */
  outline: z.object({ type: z.literal('MultiLineString'), coordinates: z.array(z.array(z.tuple([z.number(), z.number()]))) }),
})
export type Patch = z.infer<typeof patch>

export const patchAnswers = ['patches', 'none above', 'nothing seen', 'no view'] as const

export const regionPatches = z.object({
  regionId: id,
  feedId: id,
  unit: z.string().nullable(),
  level: shownLevel,
  answer: z.enum(patchAnswers),
  /** The answer in one sentence. */
  sentence: z.string(),
  /** Null: no view that day. */
  view: z.object({ day, observedAt: instant, layerIds: z.array(id), coverage: z.number().nullable() }).nullable(),
  /** The usable view before, which changes are told against. */
  before: z.object({ day, coverage: z.number().nullable(), areaAboveKm2: z.number() }).nullable(),
  areaAboveKm2: z.number().nullable(),
  patches: z.array(patch),
  /** Smaller ones that are not listed. */
  others: z.object({ patches: z.number().int(), cells: z.number().int(), areaKm2: z.number() }),
  /** Patches of the view before that none now overlaps. */
  gone: z.array(z.object({ kind: z.enum(['gone', 'not seen now']), areaKm2: z.number(), greatest: z.number(), peak: place })),
})
export type RegionPatches = z.infer<typeof regionPatches>

/** The largest patch as an alert keeps it. */
export const evidencePatch = z.object({
  level: z.number(),
  areaKm2: z.number(),
  atLeast: z.boolean(),
  cells: z.number().int(),
  greatest: z.number(),
  latitude: z.number(),
  longitude: z.number(),
  siteName: z.string().nullable(),
  nearest: away.nullable(),
  peakAway: away.nullable(),
  /** How many patches there were. */
  patches: z.number().int(),
})
export type EvidencePatch = z.infer<typeof evidencePatch>

export const viewQuery = z.object({
  feedId: z.coerce.number().int().positive(),
  day: day.optional(),
  level,
})

/** Everything kept of one view of a region. */
export const regionView = z.object({
  regionId: id,
  feedId: id,
  unit: z.string().nullable(),
  scale: z.enum(['log10', 'linear']),
  level: shownLevel,
  /** Days with a view: the first, the last, and those beside the one asked for. */
  first: day.nullable(),
  last: day.nullable(),
  previous: day.nullable(),
  next: day.nullable(),
  view: z
    .object({
      day,
      observedAt: instant,
      endsAt: instant.nullable(),
      layerIds: z.array(id),
      coverage: z.number().nullable(),
      waterAreaKm2: z.number(),
      validAreaKm2: z.number(),
      cells: z.number().int(),
      valid: z.number().int(),
      mean: z.number().nullable(),
      geometricMean: z.number().nullable(),
      median: z.number().nullable(),
      p10: z.number().nullable(),
      p90: z.number().nullable(),
      max: z.object({ value: z.number(), latitude: z.number(), longitude: z.number(), away: away.nullable() }).nullable(),
      /** Area by value, in the bins that hold any and those between: `to` null has no upper end, `from` null holds all below. */
      histogram: z.array(z.object({ from: z.number().nullable(), to: z.number().nullable(), areaKm2: z.number() })),
      /** By the histogram; null where the level lies beyond it. */
      areaAboveKm2: z.number().nullable(),
      /** Water not seen, by reason, with its share of the water; a cell may have several reasons. */
      masked: z.array(z.object({ reason: z.string(), areaKm2: z.number(), share: z.number() })),
    })
    .nullable(),
})
export type RegionView = z.infer<typeof regionView>
