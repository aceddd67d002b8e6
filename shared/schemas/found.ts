import { z } from 'zod'

export const axisRoles = ['latitude', 'longitude', 'time', 'level', 'projected', 'other'] as const

/** One dimension of a variable, with what the file says of its coordinate. */
export const foundAxis = z.object({
  dimension: z.string(),
  size: z.number(),
  role: z.enum(axisRoles),
  /** Name of the coordinate variable; null where the file has none. */
  coordinate: z.string().nullable(),
  /** As the file spells it. */
  unit: z.string().nullable(),
  first: z.number().nullable(),
  last: z.number().nullable(),
  /** Distance of neighbours, without sign; null where it is uneven, or there are no two. */
  spacing: z.number().nullable(),
  direction: z.enum(['ascending', 'descending']).nullable(),
})
export type FoundAxis = z.infer<typeof foundAxis>

/** An attribute as text; `length` is that of the whole value where only its beginning is given. */
export const foundAttribute = z.object({ name: z.string(), value: z.string(), length: z.number().int().nullable() })
export type FoundAttribute = z.infer<typeof foundAttribute>
export const foundAttributes = z.object({
  items: z.array(foundAttribute),
  /** How many more there are. */
  leftOut: z.number().int(),
})
export type FoundAttributes = z.infer<typeof foundAttributes>

/**
 * Cells by value. Edge k lies at (firstBin + k) * step; of a log10 histogram that is the base-10 logarithm of the edge. A
 * value on an edge belongs to the bin above it.
 */
export const foundHistogram = z.object({
  scale: z.enum(['log10', 'linear']),
  step: z.number().positive(),
  firstBin: z.number().int(),
  counts: z.array(z.number().int()),
  /** Cells below the first edge, and from the last edge on. */
  below: z.number().int(),
  above: z.number().int(),
  p2: z.number(),
  p10: z.number(),
  median: z.number(),
  p90: z.number(),
  p98: z.number(),
})
export type FoundHistogram = z.infer<typeof foundHistogram>

const held = {
  /** Cells with a value, without one, and with one that the file's own valid range leaves out. */
  value: z.number().int(),
  missing: z.number().int(),
  outside: z.number().int(),
}

/** The cells looked at, by the reasons there are not to keep them and by what the file holds for them. */
export const foundCells = z.object({
  /** Flag meanings in the file's order, and `reasonFilled` where it marks cells that were filled in. */
  reasons: z.array(z.string()),
  groups: z.array(
    z.object({
      /** Positions in `reasons`: all that these cells carry. */
      carry: z.array(z.number().int()),
      ...held,
    }),
  ),
  /** Cells with rarer mixtures of flags than those listed. */
  unlisted: z.object(held),
})
export type FoundCells = z.infer<typeof foundCells>
