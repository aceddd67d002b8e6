import { audit } from '../accounts/audit'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { layersDerivedFrom } from '../queries/derived-layers'
import { activeGeometries } from '../queries/geometries'
import { layersById } from '../queries/layers'
import { queueRereading } from './reread-views'
import { viewKeysOf } from './summarise-layers'

/** Marks a layer suspect, or takes that back: its views are made anew without it, or with it, and judged again. */
export async function markSuspect(context: Context, person: Person, id: number, { suspect, note }: { suspect: boolean; note: string }): Promise<void> {
  await context.db.write(async (tx) => {
    const layer = await context.models.layers.findByPk(id, { transaction: tx })
    if (!layer) throw new ApiError('not-found', 'There is no such layer.')
    const mark = suspect ? { suspectAt: context.clock.now(), suspectBy: person.id, suspectNote: note } : { suspectAt: null, suspectBy: null, suspectNote: null }
    await layer.update(mark, { transaction: tx })
    const subject = `layer of ${new Date(layer.observedAt).toISOString().slice(0, 10)}`
    const geometries = await activeGeometries(context)
    const touched = [{ id, feedId: layer.feedId }, ...(await layersDerivedFrom(context, tx, [id]))]
    const placed = await layersById(context, touched.map((one) => one.id))
    const views = [...new Set(touched.map((one) => one.feedId))].flatMap((feedId) => viewKeysOf(placed.filter((one) => one.feedId === feedId), geometries, feedId))
    await queueRereading(context, tx, { key: `layer ${id}`, subject, views })
    await audit(context, tx, { userId: person.id, action: suspect ? 'layer:suspect' : 'layer:trust', subject: `layer ${id}`, details: { note } })
  })
  context.news.tell({ topic: 'feeds' })
  context.wake()
}
