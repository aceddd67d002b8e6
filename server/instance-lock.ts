import { mkdir } from 'node:fs/promises'
import { join } from 'node:path'
import sqlite3 from 'sqlite3'

export interface InstanceLock {
  release(): Promise<void>
}

/**
 * One process serves a data folder. The lock is an open exclusive transaction on a database of its own: the system frees
 * it whatever way the process ends. Null: another process holds it.
 */
export async function takeInstanceLock(dataDir: string): Promise<InstanceLock | null> {
  await mkdir(dataDir, { recursive: true })
  const db = await new Promise<sqlite3.Database>((resolve, reject) => {
    const opened = new sqlite3.Database(join(dataDir, 'instance.lock'), (error) => (error ? reject(error) : resolve(opened)))
  })
  const run = (sql: string) => new Promise<void>((resolve, reject) => db.exec(sql, (error) => (error ? reject(error) : resolve())))
  const close = () => new Promise<void>((resolve) => db.close(() => resolve()))
  try {
    db.configure('busyTimeout', 100)
    await run('BEGIN EXCLUSIVE')
  } catch {
    await close()
    return null
  }
  return {
    release: async () => {
      await run('ROLLBACK').catch(() => undefined)
      await close()
    },
  }
}
