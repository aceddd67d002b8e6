import type { Context } from '../context'
import type { LayerRefused } from '../grids/layer-refused'
import type { FileRecord } from '../models/file'
import { withdrawLayers } from './withdraw-layers'

/** Refuses a file with code, sentence and facts, and takes out whatever layers it gave before it turned out unreadable. */
export async function refuseFile(context: Context, file: FileRecord, refused: LayerRefused): Promise<void> {
  const refusal = { code: refused.code, message: refused.message, details: refused.facts }
  await context.db.write(async (tx) => {
    await withdrawLayers(context, tx, file, 'after refusing')
    await file.update({ status: 'refused', refusal, processedAt: context.clock.now() }, { transaction: tx })
  })
  context.news.tell({ topic: 'files', id: file.id })
}

/** A file already read may turn out damaged when it is read again, under another's job: it is the one refused. */
export async function refuseStored(context: Context, refused: LayerRefused): Promise<boolean> {
  const checksum = refused.facts['checksum']
  if (typeof checksum !== 'string') return false
  const files = await context.models.files.findAll({ where: { checksum, status: 'processed' } })
  for (const file of files) await refuseFile(context, file, refused)
  return files.length > 0
}
