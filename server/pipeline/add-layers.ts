import type { Context } from '../context'
import type { FileRow } from '../models/file'
import type { SeenGrid } from '../workers/inspect-file'
import type { FeedMatch } from './match-feeds'

/** Keeps each grid once, by its fingerprint; answers their ids in order. */
export async function keepGrids(context: Context, grids: readonly SeenGrid[]): Promise<number[]> {
  return context.db.write(async (tx) => {
    const ids: number[] = []
    for (const grid of grids) {
      await context.db.run(
        `INSERT INTO grids (fingerprint, kind, row_count, column_count, west, south, east, north, definition)
         VALUES ($fingerprint, $kind, $rows, $columns, $west, $south, $east, $north, $definition)
         ON CONFLICT (fingerprint) DO NOTHING`,
        { ...grid },
        tx,
      )
      const kept = await context.db.first<{ id: number }>('SELECT id FROM grids WHERE fingerprint = $fingerprint', { fingerprint: grid.fingerprint }, tx)
      ids.push(kept!.id)
    }
    return ids
  })
}

export interface LayerBatch {
  file: FileRow
  match: FeedMatch
  steps: FeedMatch['steps']
  gridId: number
  /** As the file says; the feed's own where it says nothing. */
  processingVersion: string | null
  /** When the file was made, as far as anybody says. */
  producedAt: number | null
}

/** One layer a step, once however often it is run; answers the ids in the order of the steps. */
export async function addLayers(context: Context, { file, match, steps, gridId, processingVersion, producedAt }: LayerBatch): Promise<number[]> {
  const rows = steps.map(({ step, time }) => ({
    step,
    observedAt: time.observedAt,
    endsAt: time.endsAt,
    hasClock: time.hasClock ? 1 : 0,
  }))
  return context.db.write(async (tx) => {
    await context.db.run(
      `INSERT INTO layers (feed_id, file_id, grid_id, variable, step, observed_at, ends_at, has_clock, checksum, processing_version, stage, received_at, produced_at)
       SELECT $feedId, $fileId, $gridId, $variable, r.value ->> 'step', r.value ->> 'observedAt', r.value ->> 'endsAt', r.value ->> 'hasClock',
         $checksum, $processingVersion, $stage, $receivedAt, $producedAt
       FROM json_each($rows) r WHERE true
       ON CONFLICT (feed_id, observed_at, checksum, step) DO UPDATE SET produced_at = ifnull(produced_at, excluded.produced_at)`,
      {
        feedId: match.feed.id,
        fileId: file.id,
        gridId,
        variable: match.variable.name,
        checksum: file.checksum,
        processingVersion: processingVersion ?? match.feed.processingVersion,
        stage: match.feed.stage,
        receivedAt: file.receivedAt,
        producedAt,
        rows: JSON.stringify(rows),
      },
      tx,
    )
    const kept = await context.db.all<{ id: number; step: number; observedAt: number }>(
      `SELECT id, step, observed_at AS observedAt FROM layers WHERE feed_id = $feedId AND checksum = $checksum
       AND observed_at BETWEEN $first AND $last`,
      {
        feedId: match.feed.id,
        checksum: file.checksum,
        first: Math.min(...rows.map((row) => row.observedAt)),
        last: Math.max(...rows.map((row) => row.observedAt)),
      },
      tx,
    )
    const byStep = new Map(kept.map((layer) => [`${layer.step}:${layer.observedAt}`, layer.id]))
    return rows.map((row) => byStep.get(`${row.step}:${row.observedAt}`)!)
  })
}
