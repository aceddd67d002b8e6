import { epochDayOf } from '../../shared/science/local-day'
import type { Layer } from '../../shared/schemas/layers'
import type { Context } from '../context'

interface Row {
  id: number
  feedId: number
  fileId: number
  fileName: string
  checksum: string
  variable: string
  unit: string | null
  observedAt: number
  endsAt: number | null
  hasClock: number
  processingVersion: string
  stage: string
  receivedAt: number
  kind: string
  gridRows: number
  gridColumns: number
  west: number
  south: number
  east: number
  north: number
  suspectAt: number | null
  suspectBy: string | null
  suspectNote: string | null
  formula: string | null
  formulaVersion: string | null
  bands: string | null
  replacedBy: number | null
}

export interface LayersWanted {
  feedId?: number | undefined
  from?: string | undefined
  to?: string | undefined
  id?: number
}

const dayMs = 86_400_000

/** Layers, the last observed first; `after` is the last one of the page before. */
export async function layerRows(context: Context, wanted: LayersWanted, after: number | null, limit: number): Promise<Layer[]> {
  const rows = await context.db.all<Row>(
    `SELECT l.id, l.feed_id AS feedId, l.file_id AS fileId, f.name AS fileName, l.checksum, l.variable, fe.unit, l.observed_at AS observedAt,
       l.ends_at AS endsAt, l.has_clock AS hasClock, l.processing_version AS processingVersion, l.stage, l.received_at AS receivedAt,
       g.kind, g.row_count AS gridRows, g.column_count AS gridColumns, g.west, g.south, g.east, g.north,
       l.suspect_at AS suspectAt, u.name AS suspectBy, l.suspect_note AS suspectNote,
       fe.formula, fe.formula_version AS formulaVersion,
       (SELECT json_group_array(json_object('wavelengthNm', s.wavelength_nm, 'variable', s.variable, 'fileId', s.file_id))
         FROM (SELECT * FROM layer_sources WHERE layer_id = l.id ORDER BY slot) s) AS bands,
       coalesce(l.replaced_by, (SELECT b.replaced_by FROM layer_sources s JOIN layers b ON b.file_id = s.file_id AND b.step = s.step AND b.variable = s.variable
         WHERE s.layer_id = l.id AND b.replaced_by IS NOT NULL LIMIT 1)) AS replacedBy
     FROM layers l JOIN files f ON f.id = l.file_id JOIN feeds fe ON fe.id = l.feed_id JOIN grids g ON g.id = l.grid_id
       LEFT JOIN users u ON u.id = l.suspect_by
     WHERE ($id IS NULL OR l.id = $id) AND ($feedId IS NULL OR l.feed_id = $feedId)
       AND ($from IS NULL OR l.observed_at >= $from) AND ($to IS NULL OR l.observed_at < $to)
       AND ($after IS NULL OR (l.observed_at, l.id) < (SELECT observed_at, id FROM layers WHERE id = $after))
     ORDER BY l.observed_at DESC, l.id DESC LIMIT $limit`,
    {
      id: wanted.id ?? null,
      feedId: wanted.feedId ?? null,
      from: wanted.from === undefined ? null : epochDayOf(wanted.from) * dayMs,
      to: wanted.to === undefined ? null : (epochDayOf(wanted.to) + 1) * dayMs,
      after,
      limit,
    },
  )
  return rows.map(present)
}

function present({ kind, gridRows, gridColumns, west, south, east, north, suspectAt, suspectBy, suspectNote, formula, formulaVersion, bands, ...row }: Row): Layer {
  const iso = (instant: number) => new Date(instant).toISOString()
  return {
    ...row,
    observedAt: iso(row.observedAt),
    endsAt: row.endsAt === null ? null : iso(row.endsAt),
    hasClock: row.hasClock === 1,
    receivedAt: iso(row.receivedAt),
    grid: { kind, rows: gridRows, columns: gridColumns, west, south, east, north },
    derived: formula === null ? null : { formula, formulaVersion: formulaVersion ?? '', bands: JSON.parse(bands ?? '[]') as NonNullable<Layer['derived']>['bands'] },
    suspect: suspectAt === null ? null : { at: iso(suspectAt), by: suspectBy ?? '', note: suspectNote ?? '' },
  }
}
