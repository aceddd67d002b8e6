import { createReadStream } from 'node:fs'
import { basename } from 'node:path'
import type { Context } from '../context'
import { takeInstanceLock } from '../instance-lock'
import { voidLeases } from '../jobs/void-leases'
import { startTicker } from '../jobs/ticker'
import type { FileRecord } from '../models/file'
import { receiveFile } from '../pipeline/receive-file'
import { storeStream } from '../pipeline/stored-files'
import { BadUsage } from './bad-usage'
import { checkReadable } from './readable-file'

export interface Ingesting {
  paths: readonly string[]
  /** As the web upload takes them: the feed they belong to, and the time for files without one of their own. */
  feedId: number | null
  observedAt: number | null
}

/**
 * Takes files in as an upload does, and reads them unless a server runs that does so. Prints one line a file; answers
 * whether none was refused.
 */
export async function ingestFiles(context: Context, { paths, feedId, observedAt }: Ingesting): Promise<boolean> {
  for (const path of paths) await checkReadable(path)
  if (feedId !== null && !(await context.models.feeds.findByPk(feedId))) throw new BadUsage(`There is no feed ${feedId}.`)
  const lock = await takeInstanceLock(context.env.dataDir)
  const files: FileRecord[] = []
  for (const path of paths) {
    const arrived = await storeStream(context.env, createReadStream(path))
    files.push(await receiveFile(context, { name: basename(path), arrived, origin: 'command', userId: null, feedId, observedAt }))
  }
  if (!lock) {
    console.log(`${files.length} queued; the running server takes them from here.`)
    return true
  }
  await voidLeases(context)
  const ticker = startTicker(context, { cron: false })
  await ticker.drain()
  await ticker.stop()
  await lock.release()
  for (const file of files) {
    await file.reload()
    console.log(lineOf(file))
  }
  return files.every((file) => file.status !== 'refused')
}

function lineOf({ name, status, refusal, waitingFor }: FileRecord): string {
  return `${name}: ${status}${refusal ? ` (${refusal.code}). ${refusal.message}` : ''}${waitingFor ? `. ${waitingFor}` : ''}`
}
