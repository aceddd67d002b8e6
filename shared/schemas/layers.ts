import { z } from 'zod'
import { day, id, instant } from './common'

export const layer = z.object({
  id,
  feedId: id,
  fileId: id,
  fileName: z.string(),
  checksum: z.string(),
  variable: z.string(),
  unit: z.string().nullable(),
  observedAt: instant,
  endsAt: instant.nullable(),
  hasClock: z.boolean(),
  processingVersion: z.string(),
  stage: z.string(),
  receivedAt: instant,
  grid: z.object({
    kind: z.string(),
    rows: z.number(),
    columns: z.number(),
    west: z.number(),
    south: z.number(),
    east: z.number(),
    north: z.number(),
  }),
  /** Set where the values are worked out from other layers whenever they are read. */
  derived: z
    .object({ formula: z.string(), formulaVersion: z.string(), bands: z.array(z.object({ wavelengthNm: z.number(), variable: z.string(), fileId: id })) })
    .nullable(),
  suspect: z.object({ at: instant, by: z.string(), note: z.string() }).nullable(),
  /** The newer file that took its place, or that of a band it is worked out from: it takes no part in any figure. */
  replacedBy: id.nullable().optional(),
})
export type Layer = z.infer<typeof layer>

/** What the same place showed on the days around this day of year in earlier years. */
export const usualHere = z.object({
  /** Days before and after that are looked at. */
  halfWidthDays: z.number().int(),
  /** Null: never seen then, or no earlier years. */
  median: z.number().nullable(),
  /** Values it is the median of. */
  values: z.number().int(),
  /** Earlier years with a value, and earlier years with a layer at all. */
  years: z.number().int(),
  yearsWithLayers: z.number().int(),
  /** Earlier years were left out because there are too many layers to read for one answer. */
  cut: z.boolean(),
})
export type UsualHere = z.infer<typeof usualHere>

export const layerPoint = z.object({
  layerId: id,
  latitude: z.number(),
  longitude: z.number(),
  row: z.number().int().nullable(),
  column: z.number().int().nullable(),
  value: z.number().nullable(),
  unit: z.string().nullable(),
  /** The cell itself: its middle, its corners in order round it, null outside the grid. Longitudes go on past 180. */
  cell: z
    .object({ latitude: z.number(), longitude: z.number(), corners: z.array(z.tuple([z.number(), z.number()])).length(4) })
    .nullable(),
  /** Only where asked for. */
  usual: usualHere.nullable(),
})
export type LayerPoint = z.infer<typeof layerPoint>

/** Which days a feed has layers of. */
export const feedDays = z.object({
  feedId: id,
  /** Of the whole feed; null without a layer. */
  first: day.nullable(),
  last: day.nullable(),
  /** Days with a layer, in order, the day of observation in UTC; of composites the day they begin. */
  days: z.array(
    z.object({ day, layers: z.array(z.object({ id, observedAt: instant, endsAt: instant.nullable(), hasClock: z.boolean(), suspect: z.boolean() })) }),
  ),
})
export type FeedDays = z.infer<typeof feedDays>
