import { createHash } from 'node:crypto'
import { open } from 'node:fs/promises'
import type { Env } from '../env'
import { arrivingName, dropFile, type Arrived } from '../pipeline/stored-files'
import { PullFailed } from './pull-failed'

/** Where a fetched file lands: what came before a cut stays, and its checksum grows with it. */
export interface Landing {
  readonly size: number
  /** Begins anew from the first byte. */
  restart(): Promise<void>
  /** Refuses bytes beyond the largest file taken, before they are written. */
  expect(bytes: number): void
  add(chunk: Buffer): Promise<void>
  finish(): Promise<Arrived>
  drop(): Promise<void>
}

export async function openLanding(env: Env): Promise<Landing> {
  const temporary = await arrivingName(env)
  const handle = await open(temporary, 'ax')
  let hash = createHash('sha256')
  let size = 0
  let closed = false
  const close = async () => {
    if (!closed) await handle.close()
    closed = true
  }
  const expect = (bytes: number) => {
    if (size + bytes <= env.maxUploadBytes) return
    throw new PullFailed(`The file is larger than the ${Math.round(env.maxUploadBytes / 1048576)} MB that are taken.`, { lasting: true })
  }
  return {
    get size() {
      return size
    },
    restart: async () => {
      await handle.truncate(0)
      hash = createHash('sha256')
      size = 0
    },
    expect,
    add: async (chunk) => {
      expect(chunk.length)
      await handle.appendFile(chunk)
      hash.update(chunk)
      size += chunk.length
    },
    finish: async () => {
      await handle.sync()
      await close()
      return { checksum: hash.digest('hex'), bytes: size, temporary }
    },
    drop: async () => {
      await close()
      await dropFile({ checksum: '', bytes: 0, temporary })
    },
  }
}
