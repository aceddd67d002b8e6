import type { Context } from '../context'
import type { Transaction } from '../db'

export interface BandSource {
  fileId: number
  variable: string
  step: number
  wavelengthNm: number
}

export interface DerivedLayer {
  /** The layer of the source feed whose grid, time and version it has. */
  sourceId: number
  /** In the order of the formula's bands. */
  bands: BandSource[]
}

/** Writes derived layers with their recipes, each once; a recipe that changed replaces the one before. */
export async function writeDerivedLayers(context: Context, of: { feedId: number; variable: string }, layers: readonly DerivedLayer[]): Promise<number[]> {
  if (layers.length === 0) return []
  const sourceIds = JSON.stringify(layers.map((layer) => layer.sourceId))
  return context.db.write(async (tx) => {
    await context.db.run(
      `INSERT INTO layers (feed_id, file_id, grid_id, variable, step, observed_at, ends_at, has_clock, checksum, processing_version, stage, received_at, produced_at)
       SELECT $feedId, file_id, grid_id, $variable, step, observed_at, ends_at, has_clock, checksum, processing_version, stage, received_at, produced_at
       FROM layers WHERE id IN (SELECT value FROM json_each($sourceIds)) ORDER BY id
       ON CONFLICT (feed_id, observed_at, checksum, step) DO NOTHING`,
      { ...of, sourceIds },
      tx,
    )
    const made = await context.db.all<{ id: number; sourceId: number }>(
      `SELECT d.id, s.id AS sourceId FROM json_each($sourceIds) w JOIN layers s ON s.id = w.value
       JOIN layers d ON d.feed_id = $feedId AND d.observed_at = s.observed_at AND d.checksum = s.checksum AND d.step = s.step`,
      { feedId: of.feedId, sourceIds },
      tx,
    )
    const idOf = new Map(made.map(({ id, sourceId }) => [sourceId, id]))
    const recipes = layers.flatMap(({ sourceId, bands }) =>
      bands.map((band, slot) => [idOf.get(sourceId), slot, band.fileId, band.variable, band.step, band.wavelengthNm]),
    )
    await context.db.run(
      `INSERT INTO layer_sources (layer_id, slot, file_id, variable, step, wavelength_nm)
       SELECT value ->> 0, value ->> 1, value ->> 2, value ->> 3, value ->> 4, value ->> 5 FROM json_each($recipes) WHERE true
       ON CONFLICT (layer_id, slot) DO UPDATE SET file_id = excluded.file_id, variable = excluded.variable, step = excluded.step,
         wavelength_nm = excluded.wavelength_nm`,
      { recipes: JSON.stringify(recipes) },
      tx,
    )
    return [...new Set(made.map(({ id }) => id))]
  })
}

/** Layers of a derived feed's source that share time and grid with any of the given layers of its sources, by id. */
export async function sourceLayersBeside(context: Context, feed: { derivedFrom: number; derivedSources: readonly number[] }, layerIds: readonly number[]): Promise<number[]> {
  const rows = await context.db.all<{ id: number }>(
    `SELECT DISTINCT s.id FROM json_each($layerIds) w JOIN layers n ON n.id = w.value AND n.feed_id IN (SELECT value FROM json_each($feedIds))
     JOIN layers s ON s.feed_id = $derivedFrom AND s.observed_at = n.observed_at AND s.grid_id = n.grid_id ORDER BY s.observed_at, s.id`,
    { layerIds: JSON.stringify(layerIds), feedIds: JSON.stringify(feed.derivedSources), derivedFrom: feed.derivedFrom },
  )
  return rows.map((row) => row.id)
}

/** Derived layers whose recipes name what the given layers read. */
export async function layersDerivedFrom(context: Context, tx: Transaction, layerIds: readonly number[]): Promise<{ id: number; feedId: number }[]> {
  return context.db.all<{ id: number; feedId: number }>(
    `SELECT DISTINCT d.id, d.feed_id AS feedId FROM json_each($layerIds) w JOIN layers l ON l.id = w.value
     JOIN layer_sources s ON s.file_id = l.file_id AND s.variable = l.variable AND s.step = l.step JOIN layers d ON d.id = s.layer_id`,
    { layerIds: JSON.stringify(layerIds) },
    tx,
  )
}
