import { audit } from '../accounts/audit'
import type { Person } from '../accounts/person'
import { can } from '../../shared/permissions'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { queueJudging } from './queue-judging'
import { removeStored } from './stored-files'
import { summariseViews, type ViewKey } from './summarise-views'

/** Deletes a file with its layers; the views they were part of are made anew from what is left, and judged again. */
export async function deleteFile(context: Context, person: Person, id: number): Promise<void> {
  const file = await context.models.files.findByPk(id)
  if (!file) throw new ApiError('not-found', 'There is no such file.')
  if (file.uploadedBy !== person.id && !can(person, 'file:any')) throw new ApiError('not-allowed', 'Only an admin deletes files that somebody else sent.')
  if (file.status === 'received' || file.status === 'processing') throw new ApiError('conflict', `${file.name} is being read. Delete it when that is done.`)
  const keys = await context.db.all<ViewKey>(
    `SELECT DISTINCT v.geometry_id AS geometryId, v.feed_id AS feedId, v.day FROM layers l JOIN view_layers v ON v.layer_id = l.id WHERE l.file_id = $id`,
    { id },
  )
  await context.db.write(async (tx) => {
    await file.destroy({ transaction: tx })
    await audit(context, tx, { userId: person.id, action: 'file:delete', subject: `file ${id}`, details: { name: file.name, checksum: file.checksum } })
  })
  const feeds = new Set(keys.map((key) => key.feedId))
  await summariseViews(context, keys, async (tx) => {
    for (const feedId of feeds) await queueJudging(context, tx, { feedId })
  })
  if ((await context.models.files.count({ where: { checksum: file.checksum } })) === 0) await removeStored(context.env, file.checksum)
  context.news.tell({ topic: 'files', id }, { topic: 'feeds' }, { topic: 'regions' })
  context.wake()
}
