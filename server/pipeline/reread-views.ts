import type { Context } from '../context'
import type { Transaction } from '../db'
import { enqueueJob } from '../jobs/queue'
import type { JobRecord } from '../models/job'
import { queueJudging } from './queue-judging'
import { summariseViews, type ViewKey } from './summarise-views'

/** Queues making views anew, in the transaction that changed which layers they hold. */
export async function queueRereading(context: Context, tx: Transaction, { key, subject, views }: { key: string; subject: string; views: readonly ViewKey[] }): Promise<void> {
  const packed = JSON.stringify(views.map((view) => [view.geometryId, view.feedId, view.day]))
  await enqueueJob(context, tx, { kind: 'reread-views', key, subject, payload: { views: packed }, priority: 25 })
}

/** The views a layer belongs to, or all layers of a file do. */
export async function viewsHolding(context: Context, tx: Transaction, of: { layerId: number } | { fileId: number }): Promise<ViewKey[]> {
  const [column, id] = 'layerId' in of ? (['l.id', of.layerId] as const) : (['l.file_id', of.fileId] as const)
  const derived = 'fileId' in of ? 'OR l.id IN (SELECT layer_id FROM layer_sources WHERE file_id = $id)' : ''
  return context.db.all<ViewKey>(
    `SELECT DISTINCT v.geometry_id AS geometryId, v.feed_id AS feedId, v.day FROM layers l JOIN view_layers v ON v.layer_id = l.id WHERE ${column} = $id ${derived}`,
    { id },
    tx,
  )
}

/** Makes the named views anew from the layers they hold now, and queues judging. */
export async function rereadViews(context: Context, job: JobRecord): Promise<'done'> {
  const packed = JSON.parse(String(job.payload['views'])) as [number, number, number][]
  const views = packed.map(([geometryId, feedId, day]) => ({ geometryId, feedId, day }))
  await summariseViews(context, views, async (tx) => {
    for (const feedId of new Set(views.map((view) => view.feedId))) await queueJudging(context, tx, { feedId })
  })
  context.news.tell({ topic: 'regions' })
  return 'done'
}
