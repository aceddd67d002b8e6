import type { GridMasks, MaskChange } from '../../shared/schemas/masks'
import type { Context } from '../context'
import type { Transaction } from '../db'

export interface MaskRow {
  id: number
  feedId: number
  gridId: number
  version: number
  kind: GridMasks['masks'][number]['kind']
  fromDay: number | null
  toDay: number | null
  minShare: number | null
  layers: number | null
  waterCells: number | null
  gained: number | null
  lost: number | null
  note: string
  checksum: string
  madeBy: string | null
  createdAt: number
}

const columns = `m.id, m.feed_id AS feedId, m.grid_id AS gridId, m.version, m.kind, m.from_day AS fromDay, m.to_day AS toDay, m.min_share AS minShare,
  m.layers, m.water_cells AS waterCells, m.gained, m.lost, m.note, m.checksum, u.name AS madeBy, m.created_at AS createdAt
  FROM masks m LEFT JOIN users u ON u.id = m.made_by`

/** Without their cells, newest version first. */
export async function masksOf(context: Context, feedId: number, gridId: number, tx?: Transaction): Promise<MaskRow[]> {
  return context.db.all<MaskRow>(`SELECT ${columns} WHERE m.feed_id = $feedId AND m.grid_id = $gridId ORDER BY m.version DESC`, { feedId, gridId }, tx)
}

export async function maskById(context: Context, id: number, tx?: Transaction): Promise<MaskRow | undefined> {
  return context.db.first<MaskRow>(`SELECT ${columns} WHERE m.id = $id`, { id }, tx)
}

/** The cells of a mask, a bit each, deflated; null for the outline. */
export async function maskWater(context: Context, id: number): Promise<Buffer | null> {
  return (await context.db.first<{ water: Buffer | null }>('SELECT water FROM masks WHERE id = $id', { id }))?.water ?? null
}

export interface ChosenMask {
  maskId: number
  since: number
  by: string | null
}

export async function chosenMask(context: Context, feedId: number, gridId: number, tx?: Transaction): Promise<ChosenMask | undefined> {
  return context.db.first<ChosenMask>(
    `SELECT f.mask_id AS maskId, f.since, u.name AS by FROM masks_in_force f LEFT JOIN users u ON u.id = f.by WHERE f.feed_id = $feedId AND f.grid_id = $gridId`,
    { feedId, gridId },
    tx,
  )
}

export interface LayersOnGrid {
  gridId: number
  rows: number
  columns: number
  west: number
  south: number
  east: number
  north: number
  layers: number
  oldest: number
  newest: number
  newestLayerId: number
}

/** The grids a feed's trusted layers lie on, that of the newest layer first. */
export async function gridsOfFeed(context: Context, feedId: number): Promise<LayersOnGrid[]> {
  return context.db.all<LayersOnGrid>(
    `SELECT g.id AS gridId, g.row_count AS rows, g.column_count AS columns, g.west, g.south, g.east, g.north, count(*) AS layers,
       min(l.observed_at) AS oldest, max(l.observed_at) AS newest,
       (SELECT n.id FROM layers n WHERE n.feed_id = $feedId AND n.grid_id = g.id AND n.suspect_at IS NULL AND n.replaced_by IS NULL ORDER BY n.observed_at DESC, n.id DESC LIMIT 1) AS newestLayerId
     FROM layers l JOIN grids g ON g.id = l.grid_id WHERE l.feed_id = $feedId AND l.suspect_at IS NULL AND l.replaced_by IS NULL
     GROUP BY g.id ORDER BY newest DESC, g.id DESC`,
    { feedId },
  )
}

/** How many figures, running events and open alerts of a feed rest on the regions as they are drawn now. */
export async function restingOn(context: Context, feedId: number, gridId: number): Promise<Pick<MaskChange, 'views' | 'regionsInAll' | 'runningEvents' | 'openAlerts'>> {
  const row = await context.db.first<Pick<MaskChange, 'views' | 'regionsInAll' | 'runningEvents' | 'openAlerts'>>(
    `SELECT count(*) AS views, count(DISTINCT r.id) AS regionsInAll,
       (SELECT count(*) FROM events e JOIN regions q ON q.geometry_id = e.geometry_id WHERE e.feed_id = $feedId AND e.phase = 'running' AND q.retired_at IS NULL) AS runningEvents,
       (SELECT count(*) FROM alerts a WHERE a.feed_id = $feedId AND a.state <> 'closed') AS openAlerts
     FROM summaries s JOIN regions r ON r.geometry_id = s.geometry_id JOIN provenances p ON p.id = s.provenance_id
     WHERE s.feed_id = $feedId AND p.grid_id = $gridId AND r.retired_at IS NULL`,
    { feedId, gridId },
  )
  return row!
}
