import { z } from 'zod'
import { usualMinShare } from '../science/water-mask'
import { day, id, instant } from './common'
import { jobStates } from './running'

export const maskKinds = ['land outline', 'valid share', 'own'] as const
/** The outline is there by itself; these are made from layers. */
export const madeKinds = ['valid share', 'own'] as const

export const waterMask = z.object({
  id,
  version: z.number().int(),
  kind: z.enum(maskKinds),
  inForce: z.boolean(),
  /** Days of the layers it was made from, both included; null for the outline. */
  from: day.nullable(),
  to: day.nullable(),
  /** A cell is water where it is valid in at least this share of the layers. */
  minShare: z.number().nullable(),
  layers: z.number().int().nullable(),
  /** Cells of the grid that are water; null for the outline, which nobody has counted. */
  waterCells: z.number().int().nullable(),
  /** Water here, land in the outline; and the reverse. */
  gained: z.number().int().nullable(),
  lost: z.number().int().nullable(),
  /** What else there is to know of it, in sentences. */
  note: z.string(),
  checksum: z.string(),
  madeBy: z.string().nullable(),
  madeAt: instant,
  /** Who put it in force and when; null for the outline nobody chose, and for masks not in force. */
  inForceBy: z.string().nullable(),
  inForceSince: instant.nullable(),
})
export type WaterMaskShown = z.infer<typeof waterMask>

export const maskMaking = z.object({
  kind: z.enum(madeKinds),
  from: day,
  to: day,
  layers: z.number().int(),
  by: z.string().nullable(),
  askedAt: instant,
  /** The job that makes it; null once that has been tidied away. */
  job: z.object({ id, state: z.enum(jobStates), done: z.number().int(), total: z.number().int(), lastError: z.string().nullable() }).nullable(),
  /** `same`: the layers gave a mask that was there already, `version` says which. */
  outcome: z.enum(['made', 'same']).nullable(),
  version: z.number().int().nullable(),
})
export type MaskMaking = z.infer<typeof maskMaking>

/** The masks of one grid of a feed, newest version first. */
export const gridMasks = z.object({
  gridId: id,
  rows: z.number().int(),
  columns: z.number().int(),
  west: z.number(),
  south: z.number(),
  east: z.number(),
  north: z.number(),
  layers: z.number().int(),
  oldest: day,
  newest: day,
  /** The full calendar years of its layers so far; null while there is none. */
  fullYears: z.object({ from: day, to: day }).nullable(),
  /** What its newest file itself says of land, in words; null when nothing that Offing understands. */
  own: z.string().nullable(),
  /** The grid is too large to be counted whole: only what somebody watches is. */
  watchedOnly: z.boolean(),
  masks: z.array(waterMask),
  making: maskMaking.nullable(),
})
export type GridMasks = z.infer<typeof gridMasks>

/** Grids of a feed, that of the newest layer first. */
export const feedMasks = z.object({
  feedId: id,
  items: z.array(gridMasks),
  nextCursor: z.null(),
  /** How far the feed's history has been made anew, as after another mask was put in force; null when all of it has. Until then its regions are not judged. */
  remaking: z.object({ state: z.enum(jobStates), done: z.number().int(), total: z.number().int() }).nullable(),
})
export type FeedMasks = z.infer<typeof feedMasks>

export const newMask = z
  .object({
    gridId: id,
    kind: z.enum(madeKinds),
    /** Left out: all full calendar years so far. */
    from: day.optional(),
    to: day.optional(),
    minShare: z.number().gt(0, 'A share above 0.').max(1, 'At most the whole.').default(usualMinShare),
  })
  .superRefine(({ from, to }, context) => {
    if ((from === undefined) !== (to === undefined)) context.addIssue({ code: 'custom', path: [from === undefined ? 'from' : 'to'], message: 'A period has a first and a last day.' })
    if (from !== undefined && to !== undefined && from > to) context.addIssue({ code: 'custom', path: ['to'], message: 'The period ends before it begins.' })
  })
export type NewMask = z.infer<typeof newMask>

/** `insteadOf` is the mask that was in force when the person decided. */
export const maskInForce = z.object({ insteadOf: id })

/** What putting a mask in force would change, before anybody does it. */
export const maskChange = z.object({
  maskId: id,
  insteadOf: id,
  /** Regions whose water would be other than now. One that the mask leaves without any counts all its cells: `allThen`. */
  regions: z.array(z.object({ id, name: z.string(), waterKm2Now: z.number(), waterKm2Then: z.number(), allThen: z.boolean() })),
  /** All regions whose figures are made anew, and how many of them. */
  regionsInAll: z.number().int(),
  views: z.number().int(),
  runningEvents: z.number().int(),
  openAlerts: z.number().int(),
  freshnessLimitHours: z.number(),
})
export type MaskChange = z.infer<typeof maskChange>
