import { audit } from '../accounts/audit'
import type { Person } from '../accounts/person'
import { can } from '../../shared/permissions'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { removeStored } from './stored-files'
import { withdrawLayers } from './withdraw-layers'

/** Deletes a file with its layers; the views they were part of are made anew from what is left, and judged again. */
export async function deleteFile(context: Context, person: Person, id: number): Promise<void> {
  const file = await context.models.files.findByPk(id)
  if (!file) throw new ApiError('not-found', 'There is no such file.')
  if (file.uploadedBy !== person.id && !can(person, 'file:any')) throw new ApiError('not-allowed', 'Only an admin deletes files that somebody else sent.')
  if (file.status === 'received' || file.status === 'processing') throw new ApiError('conflict', `${file.name} is being read. Delete it when that is done.`)
  await context.db.write(async (tx) => {
    await withdrawLayers(context, tx, file, 'after deleting')
    await file.destroy({ transaction: tx })
    await audit(context, tx, { userId: person.id, action: 'file:delete', subject: `file ${id}`, details: { name: file.name, checksum: file.checksum } })
  })
  if ((await context.models.files.count({ where: { checksum: file.checksum } })) === 0) await removeStored(context.env, file.checksum)
  context.news.tell({ topic: 'files', id }, { topic: 'feeds' }, { topic: 'regions' })
  context.wake()
}
