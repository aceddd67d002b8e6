import { createHash, randomUUID } from 'node:crypto'
import { createWriteStream } from 'node:fs'
import { access, mkdir, open, rename, rm } from 'node:fs/promises'
import { dirname, join } from 'node:path'
import type { Readable } from 'node:stream'
import { Transform } from 'node:stream'
import { pipeline } from 'node:stream/promises'
import type { Env } from '../env'

export interface Arrived {
  checksum: string
  bytes: number
  /** A temporary name inside the data folder; `keepFile` or `dropFile` ends it. */
  temporary: string
}

export class TooLarge extends Error {
  override name = 'TooLarge'
}

/** A new name for bytes on their way in; what lies there at the next start is cleared. */
export async function arrivingName(env: Env): Promise<string> {
  const folder = join(env.dataDir, 'files', 'arriving')
  await mkdir(folder, { recursive: true })
  return join(folder, randomUUID())
}

/** Streams bytes to a temporary name, counting and checksumming on the way, and syncs them to disk. */
export async function storeStream(env: Env, stream: Readable): Promise<Arrived> {
  const temporary = await arrivingName(env)
  const hash = createHash('sha256')
  let bytes = 0
  const meter = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      bytes += chunk.length
      hash.update(chunk)
      done(bytes > env.maxUploadBytes ? new TooLarge(`The file is larger than ${Math.round(env.maxUploadBytes / 1048576)} MB.`) : null, chunk)
    },
  })
  try {
    await pipeline(stream, meter, createWriteStream(temporary, { flags: 'wx' }))
    await sync(temporary)
  } catch (error) {
    await rm(temporary, { force: true })
    throw error
  }
  return { checksum: hash.digest('hex'), bytes, temporary }
}

/** Gives the bytes their lasting name, which is their checksum. */
export async function keepFile(env: Env, arrived: Arrived): Promise<void> {
  const path = storedPath(env, arrived.checksum)
  await mkdir(dirname(path), { recursive: true })
  if (await exists(path)) return dropFile(arrived)
  await rename(arrived.temporary, path)
  await sync(dirname(path))
}

export async function dropFile(arrived: Arrived): Promise<void> {
  await rm(arrived.temporary, { force: true })
}

export function storedPath(env: Env, checksum: string): string {
  return join(env.dataDir, 'files', checksum.slice(0, 2), checksum)
}

export async function removeStored(env: Env, checksum: string): Promise<void> {
  await rm(storedPath(env, checksum), { force: true })
}

/** What was cut off while arriving (a crash, a broken upload) is no file. */
export async function clearArriving(env: Env): Promise<void> {
  await rm(join(env.dataDir, 'files', 'arriving'), { recursive: true, force: true })
}

async function sync(path: string): Promise<void> {
  const handle = await open(path, 'r')
  try {
    await handle.sync()
  } finally {
    await handle.close()
  }
}

async function exists(path: string): Promise<boolean> {
  return access(path).then(
    () => true,
    () => false,
  )
}
