import type { Context } from '../context'
import type { JobRecord } from '../models/job'
import { queueJudging } from './queue-judging'
import { summariseLayers } from './summarise-layers'

/** Makes the views of one layer anew, after people marked it suspect or took that back. */
export async function rereadViews(context: Context, job: JobRecord): Promise<'done'> {
  const layer = await context.models.layers.findByPk(Number(job.payload['layerId']))
  if (!layer) return 'done'
  await summariseLayers(context, layer.feedId, [layer.id], (tx) => queueJudging(context, tx, { feedId: layer.feedId }))
  context.news.tell({ topic: 'regions' })
  return 'done'
}
