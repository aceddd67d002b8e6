import type { Context } from '../context'
import type { Transaction } from '../db'
import { dropLayers, releaseReplaced } from '../queries/replacements'
import { viewsOfReplaced } from './replace-file'
import { queueRereading, viewsHolding } from './reread-views'

/** Takes the layers of a file out of every view: what they showed is made anew from what is left and what they had replaced. */
export async function withdrawLayers(context: Context, tx: Transaction, file: { id: number; name: string }, why: string): Promise<void> {
  const views = [...(await viewsHolding(context, tx, { fileId: file.id })), ...(await viewsOfReplaced(context, tx, file.id))]
  await releaseReplaced(context, tx, file.id)
  await dropLayers(context, tx, file.id)
  const once = [...new Map(views.map((view) => [`${view.geometryId}:${view.feedId}:${view.day}`, view])).values()]
  if (once.length > 0) await queueRereading(context, tx, { key: `file ${file.id}`, subject: `${why} ${file.name}`, views: once })
}
