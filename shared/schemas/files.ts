import { z } from 'zod'
import { id, instant } from './common'
import { feedProposal } from './feeds'
import { foundAttributes, foundAxis, foundCells, foundHistogram } from './found'

export const fileStatuses = ['received', 'processing', 'processed', 'waiting', 'refused'] as const
export const fileStatus = z.enum(fileStatuses)
export type FileStatus = z.infer<typeof fileStatus>

export const reportVariable = z.object({
  name: z.string(),
  longName: z.string().nullable(),
  standardName: z.string().nullable().optional(),
  quantity: z.string(),
  wavelengthNm: z.number().nullable().optional(),
  unit: z.string().nullable(),
  fileUnit: z.string().nullable(),
  conversion: z.string().nullable(),
  /** In the unit of the values, inclusive; null: the file sets no limit. */
  validMin: z.number().nullable().optional(),
  validMax: z.number().nullable().optional(),
  dimensions: z.array(z.object({ name: z.string(), size: z.number() })),
  grid: z.object({
    kind: z.string(),
    rows: z.number(),
    columns: z.number(),
    west: z.number(),
    south: z.number(),
    east: z.number(),
    north: z.number(),
    crs: z.string().nullable(),
    /** Size of a cell in degrees; null where cells differ and for grids without such axes. */
    latStep: z.number().nullable().optional(),
    lonStep: z.number().nullable().optional(),
  }),
  times: z.object({
    count: z.number(),
    first: instant.nullable(),
    last: instant.nullable(),
    hasClock: z.boolean(),
    from: z.string(),
    /** Steps that stand for a period rather than an instant. */
    composites: z.number().int().optional(),
  }),
  /** It is the error, bias, uncertainty, count or flags of another variable: never proposed. */
  tellsOfAnother: z.boolean().optional(),
  /** While the file waits: it can be looked at. */
  gridId: id.optional(),
  axes: z.array(foundAxis).optional(),
  attributes: foundAttributes.optional(),
  /** Cells looked at in the first step: all, or of a very large grid sixteen bands of rows spread over it. */
  cells: z.number(),
  valid: z.number(),
  min: z.number().nullable(),
  median: z.number().nullable(),
  max: z.number().nullable(),
  histogram: foundHistogram.nullable().optional(),
  /** The same cells by what speaks against them: what would be kept under any choice of flags follows from it. */
  found: foundCells.optional(),
  /** Flag meanings found beside it, with the cells looked at that each applies to. */
  flags: z.array(z.object({ meaning: z.string(), cells: z.number().int() })).optional(),
  /** 'marked': the file says which cells were filled in; 'unmarked': it says only that some were. */
  gapFilled: z.enum(['marked', 'unmarked']).nullable().optional(),
  /** Of those, what the feeds that read it hide, or the proposal would. */
  masked: z.array(z.object({ reason: z.string(), cells: z.number().int() })).optional(),
})
export type ReportVariable = z.infer<typeof reportVariable>

export const fileReport = z.object({
  format: z.string(),
  variables: z.array(reportVariable),
  warnings: z.array(z.string()),
  /** Of the whole file. */
  attributes: foundAttributes.optional(),
  /** When the file says it was made. */
  producedAt: instant.nullable().optional(),
  /** Which feed took which variable, and in how many layers. */
  feeds: z
    .array(
      z.object({
        feedId: id,
        variable: z.string(),
        layers: z.number(),
        /** Where the time came from, if the file itself has none: 'the form', 'the address', 'the file name'. */
        timeFrom: z.string().optional(),
      }),
    )
    .default([]),
  /** While it waits: what each feed of its own would have needed. */
  missed: z.array(z.object({ feedId: id, feed: z.string(), why: z.string() })).optional(),
  /** While it waits: further feeds that the same file could serve. */
  others: z.array(feedProposal).optional(),
})
export type FileReport = z.infer<typeof fileReport>

export const refusal = z.object({
  code: z.string(),
  message: z.string(),
  details: z.record(z.string(), z.unknown()),
})

export const fileItem = z.object({
  id,
  name: z.string(),
  checksum: z.string(),
  bytes: z.number().int(),
  status: fileStatus,
  origin: z.enum(['upload', 'inbox', 'command', 'pull']),
  uploadedBy: z.object({ id, name: z.string() }).nullable(),
  receivedAt: instant,
  processedAt: instant.nullable(),
  feedId: id.nullable(),
  observedAt: instant.nullable(),
  refusal: refusal.nullable(),
  /** A sentence while the file waits: for what. */
  waitingFor: z.string().nullable(),
  progress: z.object({ done: z.number().int(), total: z.number().int() }).nullable(),
})
export type FileItem = z.infer<typeof fileItem>

export const file = fileItem.extend({
  report: fileReport.nullable(),
  proposal: feedProposal.nullable(),
  /** Further feeds this file could serve, each a proposal like the first; the bands beside a band belong together. */
  others: z.array(feedProposal),
  /** While it has a proposal: the regions that its grid meets, which would get figures. */
  wouldGive: z.object({ regions: z.array(z.object({ id, name: z.string() })), ofRegions: z.number().int() }).nullable(),
  layers: z.array(z.object({ id, feedId: id, observedAt: instant, replaced: z.boolean().optional() })),
  /** The older file whose place this one took; and the newer ones that took the place of this one's layers, when, and of how many. */
  replaces: z.object({ id, name: z.string() }).nullable().optional(),
  replacedBy: z.array(z.object({ id, name: z.string(), at: instant, layers: z.number().int() })).optional(),
  /** The figures this file gave, newest first: one row a region, feed and day (at most 200). */
  summaries: z.array(
    z.object({
      regionId: id,
      regionName: z.string(),
      feedId: id,
      day: z.string(),
      coverage: z.number().nullable(),
      median: z.number().nullable(),
      geometricMean: z.number().nullable(),
    }),
  ),
})
export type OffingFile = z.infer<typeof file>

export const receipt = z.object({
  id,
  name: z.string(),
  checksum: z.string(),
  status: fileStatus,
})

export const uploadFields = z.object({
  feedId: z.coerce.number().int().positive().optional(),
  observedAt: instant.optional(),
})

/** One variable of a waiting file as a picture: `hidden` are the flag meanings not to show, apart by blanks as in files. */
export const fileTileQuery = z.object({
  variable: z.string().min(1).max(200),
  hidden: z.string().max(10_000).default(''),
  theme: z.enum(['light', 'night']).default('light'),
})
