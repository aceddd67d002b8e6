import type { Context } from '../context'
import type { Transaction } from '../db'
import type { FileRecord } from '../models/file'
import { layersDerivedFrom } from '../queries/derived-layers'
import { activeGeometries } from '../queries/geometries'
import { layersById } from '../queries/layers'
import { layersReplacedBy, markReplaced, replacerOf } from '../queries/replacements'
import { queueRereading, viewsHolding } from './reread-views'
import { viewKeysOf } from './summarise-layers'
import type { ViewKey } from './summarise-views'

/**
 * Lets a file that corrects an older one take its place, and one that was read late step back behind its correction.
 * The older layers stay stored and remembered; no view holds them any more.
 */
export async function settleReplacement(context: Context, tx: Transaction, file: FileRecord): Promise<void> {
  const at = context.clock.now()
  for (const older of await replacedFiles(context, tx, file)) await markReplaced(context, tx, { older, newer: file.id, wholly: file.replacesWholly, at })
  const newer = await replacerOf(context, tx, file.id)
  if (newer) await markReplaced(context, tx, { older: file.id, newer: newer.id, wholly: newer.wholly, at })
}

/** The file whose place it takes; behind one that could not be read stands the one that was to be replaced by that. */
async function replacedFiles(context: Context, tx: Transaction, file: FileRecord): Promise<number[]> {
  const older: number[] = []
  for (let id = file.replaces; id !== null && id !== file.id && !older.includes(id); ) {
    older.push(id)
    const one: FileRecord | null = await context.models.files.findByPk(id, { transaction: tx })
    id = one && one.status !== 'processed' ? one.replaces : null
  }
  return older
}

/** Queues making anew every view that held what this file replaced, or that held this file itself. */
export async function queueAfterReplacement(context: Context, tx: Transaction, file: FileRecord): Promise<void> {
  const replacer = await replacerOf(context, tx, file.id)
  if (file.replaces === null && !replacer) return
  const views = [...(await viewsOfReplaced(context, tx, file.id)), ...(replacer ? await viewsHolding(context, tx, { fileId: file.id }) : [])]
  if (views.length > 0) await queueRereading(context, tx, { key: `replaced by ${file.id}`, subject: file.name, views })
}

/** The views that layers replaced by a file belong to, or would without it, those worked out from them included. */
export async function viewsOfReplaced(context: Context, tx: Transaction, fileId: number): Promise<ViewKey[]> {
  const replaced = await layersReplacedBy(context, tx, fileId)
  const touched = [...replaced, ...(await layersDerivedFrom(context, tx, replaced.map((layer) => layer.id)))]
  if (touched.length === 0) return []
  const geometries = await activeGeometries(context)
  const placed = await layersById(context, touched.map((layer) => layer.id))
  return [...new Set(touched.map((layer) => layer.feedId))].flatMap((feedId) => viewKeysOf(placed.filter((layer) => layer.feedId === feedId), geometries, feedId))
}
