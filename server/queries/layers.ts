import type { Context } from '../context'

/** A layer with its grid's box and its file's name: what summarising and pictures need. */
export interface PlacedLayer {
  id: number
  feedId: number
  fileId: number
  gridId: number
  fileName: string
  checksum: string
  variable: string
  step: number
  observedAt: number
  endsAt: number | null
  hasClock: number
  processingVersion: string
  producedAt: number | null
  west: number
  south: number
  east: number
  north: number
  rows: number
  columns: number
  hiddenFlags: string[]
  storedLog10: boolean
  fileUnit: string | null
  unit: string | null
  /** Set where the values are worked out: by which formula, of what. */
  recipe: LayerRecipe | null
}

export interface LayerRecipe {
  formula: string
  formulaVersion: string
  bands: { checksum: string; fileName: string; variable: string; step: number; wavelengthNm: number }[]
}

type Row = Omit<PlacedLayer, 'recipe' | 'hiddenFlags' | 'storedLog10'> & { hiddenFlags: string; storedLog10: number; formula: string | null; formulaVersion: string | null; bands: string | null }

const placed = `SELECT l.id, l.feed_id AS feedId, l.file_id AS fileId, l.grid_id AS gridId, f.name AS fileName, l.checksum, l.variable, l.step,
  l.observed_at AS observedAt, l.ends_at AS endsAt, l.has_clock AS hasClock, l.processing_version AS processingVersion,
  l.produced_at AS producedAt, g.west, g.south, g.east, g.north, g.row_count AS rows, g.column_count AS columns, fe.formula, fe.formula_version AS formulaVersion,
  fe.hidden_flags AS hiddenFlags, fe.stored_log10 AS storedLog10, fe.file_unit AS fileUnit, fe.unit,
  CASE WHEN fe.formula IS NULL THEN NULL ELSE (
    SELECT json_group_array(json_object('checksum', b.checksum, 'fileName', b.name, 'variable', s.variable, 'step', s.step, 'wavelengthNm', s.wavelength_nm))
    FROM (SELECT * FROM layer_sources WHERE layer_id = l.id ORDER BY slot) s JOIN files b ON b.id = s.file_id) END AS bands
  FROM layers l JOIN files f ON f.id = l.file_id JOIN grids g ON g.id = l.grid_id JOIN feeds fe ON fe.id = l.feed_id`

/** A layer is trusted unless somebody marked it suspect or a newer file replaced it, or one that it is worked out from. */
const isTrusted = `l.suspect_at IS NULL AND l.replaced_by IS NULL AND NOT EXISTS (
  SELECT 1 FROM layer_sources s JOIN layers b ON b.file_id = s.file_id AND b.step = s.step AND b.variable = s.variable
    AND (b.suspect_at IS NOT NULL OR b.replaced_by IS NOT NULL)
  WHERE s.layer_id = l.id)`

function placedLayer({ formula, formulaVersion, bands, hiddenFlags, storedLog10, ...layer }: Row): PlacedLayer {
  const recipe = formula === null || bands === null ? null : { formula, formulaVersion: formulaVersion ?? '', bands: JSON.parse(bands) as LayerRecipe['bands'] }
  return { ...layer, hiddenFlags: JSON.parse(hiddenFlags) as string[], storedLog10: storedLog10 === 1, recipe }
}

export async function layersById(context: Context, ids: readonly number[]): Promise<PlacedLayer[]> {
  const rows = await context.db.all<Row>(`${placed} WHERE l.id IN (SELECT value FROM json_each($ids)) ORDER BY l.id`, { ids: JSON.stringify(ids) })
  return rows.map(placedLayer)
}

/** Layers of a feed that people trust, observed between two instants (both included). */
export async function trustedLayers(context: Context, feedId: number, from: number, to: number): Promise<PlacedLayer[]> {
  const rows = await context.db.all<Row>(
    `${placed} WHERE l.feed_id = $feedId AND l.observed_at BETWEEN $from AND $to AND ${isTrusted} ORDER BY l.observed_at, l.id`,
    { feedId, from, to },
  )
  return rows.map(placedLayer)
}

/** Of some layers those that people still trust, in the order given. */
export async function trustedAmong(context: Context, ids: readonly number[]): Promise<number[]> {
  const rows = await context.db.all<{ id: number }>(`SELECT l.id FROM layers l WHERE l.id IN (SELECT value FROM json_each($ids)) AND ${isTrusted}`, { ids: JSON.stringify(ids) })
  const trusted = new Set(rows.map((row) => row.id))
  return ids.filter((id) => trusted.has(id))
}

/** Every layer of a feed, the last observed first. */
export async function layersFromNewest(context: Context, feedId: number): Promise<{ id: number; observedAt: number }[]> {
  return context.db.all('SELECT id, observed_at AS observedAt FROM layers WHERE feed_id = $feedId ORDER BY observed_at DESC, id DESC', { feedId })
}

export interface LayerTimes {
  feedId: number
  observedAt: number
  endsAt: number | null
  hasClock: number
  west: number
  south: number
  east: number
  north: number
}

/** When every layer that people trust was observed, and the box of its grid. */
export async function trustedLayerTimes(context: Context): Promise<LayerTimes[]> {
  return context.db.all<LayerTimes>(
    `SELECT l.feed_id AS feedId, l.observed_at AS observedAt, l.ends_at AS endsAt, l.has_clock AS hasClock, g.west, g.south, g.east, g.north
     FROM layers l JOIN grids g ON g.id = l.grid_id WHERE l.suspect_at IS NULL AND l.replaced_by IS NULL`,
  )
}
