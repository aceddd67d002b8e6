import { z } from 'zod'
import { day, id, instant } from './common'
import { regionGeometry } from './regions'

export const place = z.object({ longitude: z.number(), latitude: z.number() })

/** Something put right, and where. */
export const repairMark = place.extend({ about: z.string() })
export type RepairMark = z.infer<typeof repairMark>

export const measureRequest = z.object({
  geometry: z.unknown(),
  shoreBufferKm: z.number().min(0).max(50).default(0),
  inland: z.boolean().default(false),
})

/** What the newest grid of a feed holds of an outline. */
export const feedCount = z.object({
  feedId: id,
  name: z.string(),
  /** False: estimated from areas, as there are too many to count while somebody draws. */
  exact: z.boolean(),
  /** Cells the outline touches, and those wholly inside that are water. */
  cells: z.number().int(),
  wholeCells: z.number().int(),
  waterAreaKm2: z.number().nullable(),
  /** Share of the water within one cell of land. */
  nearLandShare: z.number().nullable(),
})
export type FeedCount = z.infer<typeof feedCount>

/** An outline as it would be kept. */
export const foundOutline = z.object({
  geometry: regionGeometry,
  areaKm2: z.number(),
  repairs: z.array(z.string()),
  marks: z.array(repairMark),
})

/** Why an outline cannot be kept, and where. */
export const outlineRefusal = z.object({ sentence: z.string(), place: place.nullable(), reason: z.enum(['all-land']).nullable() })
export type OutlineRefusal = z.infer<typeof outlineRefusal>

/** Asking is no fault: an outline that cannot be kept is answered with the reason. */
export const measurement = z.object({ outline: foundOutline.nullable(), refusal: outlineRefusal.nullable(), feeds: z.array(feedCount) })
export type Measurement = z.infer<typeof measurement>

export const regionVersion = z.object({
  version: z.number().int(),
  geometry: regionGeometry,
  areaKm2: z.number(),
  shoreBufferKm: z.number(),
  repairs: z.array(z.string()),
  createdAt: instant,
  createdBy: z.string().nullable(),
  inForce: z.boolean(),
  /** Views whose figures rest on it, over all feeds. */
  views: z.number().int(),
})
export type RegionVersion = z.infer<typeof regionVersion>

export const importFormats = ['GeoJSON', 'KML', 'shapefile'] as const

/** One area of a file: as it would be kept, or why it cannot be. */
export const importedArea = z.object({
  name: z.string(),
  found: foundOutline.nullable(),
  refusal: outlineRefusal.nullable(),
  /** Set once it is saved. */
  regionId: id.nullable(),
})
export type ImportedArea = z.infer<typeof importedArea>

export const importReply = z.object({ format: z.enum(importFormats), fileName: z.string(), notes: z.array(z.string()), items: z.array(importedArea) })
export type ImportReply = z.infer<typeof importReply>

export const importQuery = z.object({
  /** Save every area that can be taken, each under its name in the file. */
  save: z.enum(['true', 'false']).default('false'),
  /** Its areas of land alone are lakes or narrow inlets: take them too. */
  inland: z.enum(['true', 'false']).default('false'),
})
export const cellsQuery = z.object({ feedId: z.coerce.number().int().positive() })

export const singleCells = z.object({
  /** Whether it holds too few whole water cells for percentiles; otherwise no cells are given. */
  few: z.boolean(),
  wholeCells: z.number().int().nullable(),
  day: day.nullable(),
  unit: z.string().nullable(),
  cells: z.array(z.object({ longitude: z.number(), latitude: z.number(), share: z.number(), whole: z.boolean(), water: z.boolean(), value: z.number().nullable() })),
})
export type SingleCells = z.infer<typeof singleCells>

export const outlineQuery = z.object({ version: z.coerce.number().int().positive().optional() })
