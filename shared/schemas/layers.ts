import { z } from 'zod'
import { id, instant } from './common'

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
})
export type Layer = z.infer<typeof layer>

export const layerPoint = z.object({
  layerId: id,
  latitude: z.number(),
  longitude: z.number(),
  row: z.number().int().nullable(),
  column: z.number().int().nullable(),
  value: z.number().nullable(),
  unit: z.string().nullable(),
})
