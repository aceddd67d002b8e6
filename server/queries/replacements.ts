import type { Context } from '../context'
import type { Transaction } from '../db'

/** Layers of a file, also where the same bytes came under another row, in the feed it was sent to. */
const ofFile = (alias: string, file: string) => `(${alias}.file_id = ${file} OR EXISTS (
  SELECT 1 FROM files f WHERE f.id = ${file} AND ${alias}.checksum = f.checksum AND ${alias}.feed_id = f.feed_id))`

/**
 * Marks the layers of an older file as replaced by a newer one: all of them, or only those of instants both hold. The
 * newer one's own are live again. Marking twice changes nothing.
 */
export async function markReplaced(context: Context, tx: Transaction, { older, newer, wholly, at }: { older: number; newer: number; wholly: boolean; at: number }): Promise<void> {
  await context.db.run(`UPDATE layers SET replaced_by = NULL, replaced_at = NULL WHERE replaced_by IS NOT NULL AND ${ofFile('layers', '$newer')}`, { newer }, tx)
  await context.db.run(
    `UPDATE layers SET replaced_by = $newer, replaced_at = $at
     WHERE replaced_by IS NOT $newer AND ${ofFile('layers', '$older')} AND NOT ${ofFile('layers', '$newer')}
       AND ($wholly OR EXISTS (SELECT 1 FROM layers n WHERE n.feed_id = layers.feed_id AND n.observed_at = layers.observed_at
         AND n.ends_at IS layers.ends_at AND ${ofFile('n', '$newer')}))`,
    { older, newer, wholly: wholly ? 1 : 0, at },
    tx,
  )
}

export async function layersReplacedBy(context: Context, tx: Transaction, fileId: number): Promise<{ id: number; feedId: number }[]> {
  return context.db.all('SELECT id, feed_id AS feedId FROM layers WHERE replaced_by = $fileId ORDER BY id', { fileId }, tx)
}

/** A file is going: what it replaced is live again, or replaced by what replaced the file itself. */
export async function releaseReplaced(context: Context, tx: Transaction, fileId: number): Promise<void> {
  await context.db.run(
    `UPDATE layers SET replaced_by = (SELECT max(l.replaced_by) FROM layers l WHERE ${ofFile('l', '$fileId')}) WHERE replaced_by = $fileId`,
    { fileId },
    tx,
  )
  await context.db.run('UPDATE layers SET replaced_at = NULL WHERE replaced_by IS NULL AND replaced_at IS NOT NULL', {}, tx)
}

/** A processed file that says it replaces this one; the newest of several. */
export async function replacerOf(context: Context, tx: Transaction, fileId: number): Promise<{ id: number; wholly: boolean } | null> {
  const row = await context.db.first<{ id: number; wholly: number }>(
    `SELECT id, replaces_wholly AS wholly FROM files WHERE replaces = $fileId AND status = 'processed' ORDER BY id DESC LIMIT 1`,
    { fileId },
    tx,
  )
  return row ? { id: row.id, wholly: row.wholly === 1 } : null
}

/** Files that took the place of layers of this one, with how many. */
export async function replacersOf(context: Context, fileId: number): Promise<{ id: number; name: string; at: number; layers: number }[]> {
  return context.db.all(
    `SELECT n.id, n.name, max(l.replaced_at) AS at, count(*) AS layers FROM layers l JOIN files n ON n.id = l.replaced_by
     WHERE ${ofFile('l', '$fileId')} GROUP BY n.id ORDER BY n.id`,
    { fileId },
  )
}

/** Takes the layers of a file out, with what was worked out from it. */
export async function dropLayers(context: Context, tx: Transaction, fileId: number): Promise<void> {
  await context.db.run('DELETE FROM layer_sources WHERE file_id = $fileId', { fileId }, tx)
  await context.db.run('DELETE FROM layers WHERE file_id = $fileId', { fileId }, tx)
}
