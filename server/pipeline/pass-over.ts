import { createHash } from 'node:crypto'
import { access, mkdir, rename } from 'node:fs/promises'
import { join } from 'node:path'
import type { Context } from '../context'
import { LayerRefused } from '../grids/layer-refused'
import { TooLarge } from './stored-files'

export interface PassedOver {
  name: string
  path: string
  bytes: number
  modifiedAt: number
}

/** Faults of a path or of the disk below it, which another look does not mend. */
const unreadable = new Set(['EACCES', 'EPERM', 'EIO', 'ELOOP', 'EINVAL', 'ENXIO', 'EISDIR'])

/** Why a file of the inbox cannot be taken in; null where the fault is not its own. */
export function reasonToPassOver({ env }: Context, error: unknown, path: string): LayerRefused | null {
  if (error instanceof TooLarge) {
    return new LayerRefused('too-large', `${error.message} It was moved to inbox/refused.`, { maxUploadBytes: env.maxUploadBytes })
  }
  if (!(error instanceof Error) || !('code' in error) || !('syscall' in error)) return null
  const ofPath = error.syscall === 'read' || ('path' in error && error.path === path)
  if (!ofPath || !unreadable.has(String(error.code))) return null
  return new LayerRefused('not-readable', `The system does not let Offing read this file (${String(error.code)}). It was moved to inbox/refused.`, { code: String(error.code) })
}

/**
 * Moves a file aside and keeps a refused row, which people see among the files. Its bytes are not kept, so in place of
 * their checksum stands a name made of its name, size and time. Answers whether it could be moved.
 */
export async function passOver(context: Context, file: PassedOver, refused: LayerRefused): Promise<boolean> {
  const moved = await moveAside(context, file)
  const sentence = moved ? refused.message : refused.message.replace('It was moved to inbox/refused.', 'It could not be moved out of the inbox.')
  const checksum = `not-kept-${createHash('sha256').update(JSON.stringify([file.name, file.bytes, file.modifiedAt])).digest('hex')}`
  const at = context.clock.now()
  const row = await context.db.write(async (tx) => {
    const known = await context.models.files.findOne({ where: { checksum }, transaction: tx })
    const refusal = { code: refused.code, message: sentence, details: { ...refused.facts, fileSize: file.bytes } }
    if (known) return known.update({ refusal, processedAt: at }, { transaction: tx })
    return context.models.files.create({ name: file.name, checksum, bytes: file.bytes, status: 'refused', origin: 'inbox', receivedAt: at, processedAt: at, refusal }, { transaction: tx })
  })
  context.log.warn({ file: file.name, bytes: file.bytes, code: refused.code, moved }, 'a file of the inbox was passed over')
  context.news.tell({ topic: 'files', id: row.id })
  return moved
}

async function moveAside(context: Context, { name, path }: PassedOver): Promise<boolean> {
  const folder = join(context.env.dataDir, 'inbox', 'refused')
  try {
    await mkdir(folder, { recursive: true })
    const aside = join(folder, name)
    const taken = await access(aside).then(() => true, () => false)
    await rename(path, taken ? join(folder, `${context.clock.system()}-${name}`) : aside)
    return true
  } catch (error) {
    context.log.warn({ err: error, file: name }, 'a file of the inbox cannot be moved aside')
    return false
  }
}
