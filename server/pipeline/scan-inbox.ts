import { createReadStream } from 'node:fs'
import { mkdir, readdir, rm, stat } from 'node:fs/promises'
import { join } from 'node:path'
import type { Context } from '../context'
import { receiveFile } from './receive-file'
import { passOver, reasonToPassOver } from './pass-over'
import { storeStream } from './stored-files'

interface Looks {
  /** Size and time of each file at the last look: a file is taken once both stand still. */
  seen: Map<string, string>
  /** Files that were dealt with but could not be moved out of the folder: not read again until they change. */
  stuck: Map<string, string>
}

const lastLooks = new WeakMap<Context, Looks>()

/** Takes files dropped into the watched folder. One still being written is left for the next look; one that cannot be taken holds up no other. */
export async function scanInbox(context: Context): Promise<void> {
  const folder = join(context.env.dataDir, 'inbox')
  await mkdir(folder, { recursive: true })
  const before = lastLooks.get(context) ?? { seen: new Map<string, string>(), stuck: new Map<string, string>() }
  const now: Looks = { seen: new Map(), stuck: new Map() }
  const faults: unknown[] = []
  let taken = 0
  for (const name of (await readdir(folder)).sort()) {
    if (name.startsWith('.') || name.endsWith('.part') || name.endsWith('.tmp')) continue
    const path = join(folder, name)
    const found = await stat(path).catch(() => null)
    if (!found?.isFile()) continue
    const look = `${found.size}:${found.mtimeMs}`
    if (before.stuck.get(name) === look) {
      now.stuck.set(name, look)
      continue
    }
    const settled = before.seen.get(name) === look || context.clock.system() - found.mtimeMs > 5_000
    if (!settled) {
      now.seen.set(name, look)
      continue
    }
    try {
      if (!(await takeIn(context, name, path, found))) now.stuck.set(name, look)
      taken++
    } catch (error) {
      // No fault of this file (a full disk): it stays for the next look.
      now.seen.set(name, look)
      faults.push(error)
    }
  }
  lastLooks.set(context, now)
  if (taken > 0) context.wake()
  if (faults.length > 0) throw faults[0]
}

/** Received, or passed over with a reason; answers whether it is out of the folder. */
async function takeIn(context: Context, name: string, path: string, found: { size: number; mtimeMs: number }): Promise<boolean> {
  try {
    const arrived = await storeStream(context.env, createReadStream(path))
    await receiveFile(context, { name, arrived, origin: 'inbox', userId: null, feedId: null, observedAt: null })
  } catch (error) {
    const reason = reasonToPassOver(context, error, path)
    if (!reason) throw error
    return passOver(context, { name, path, bytes: found.size, modifiedAt: found.mtimeMs }, reason)
  }
  return rm(path).then(
    () => true,
    (error: unknown) => {
      context.log.warn({ err: error, file: name }, 'a file of the inbox was taken, and cannot be removed from it')
      return false
    },
  )
}
