import { createReadStream } from 'node:fs'
import { mkdir, readdir, rm, stat } from 'node:fs/promises'
import { join } from 'node:path'
import type { Context } from '../context'
import { receiveFile } from './receive-file'
import { storeStream } from './stored-files'

/** Size and time of each file at the last look: a file is taken once both stand still. */
const lastLook = new WeakMap<Context, Map<string, string>>()

/** Takes files dropped into the watched folder. One still being written is left for the next look. */
export async function scanInbox(context: Context): Promise<void> {
  const folder = join(context.env.dataDir, 'inbox')
  await mkdir(folder, { recursive: true })
  const before = lastLook.get(context) ?? new Map<string, string>()
  const now = new Map<string, string>()
  let taken = 0
  for (const name of (await readdir(folder)).sort()) {
    if (name.startsWith('.') || name.endsWith('.part') || name.endsWith('.tmp')) continue
    const path = join(folder, name)
    const found = await stat(path).catch(() => null)
    if (!found?.isFile()) continue
    const look = `${found.size}:${found.mtimeMs}`
    const settled = before.get(name) === look || context.clock.system() - found.mtimeMs > 5_000
    if (!settled) {
      now.set(name, look)
      continue
    }
    const arrived = await storeStream(context.env, createReadStream(path))
    await receiveFile(context, { name, arrived, origin: 'inbox', userId: null, feedId: null, observedAt: null })
    await rm(path)
    taken++
  }
  lastLook.set(context, now)
  if (taken > 0) context.wake()
}
