import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { TestProject } from 'vitest/node'
import { buildServer } from '../../server/commands/build'
import { openDatabase } from '../../server/db'
import { migrate } from '../../server/migrations'

declare module 'vitest' {
  interface ProvidedContext {
    /** A migrated, empty database; each test file copies it. */
    databaseTemplate: string
  }
}

/** Once a run: the database template, and the bundle for tests that start the real process. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const dir = await mkdtemp(join(tmpdir(), 'offing-template-'))
  const file = join(dir, 'offing.sqlite')
  const db = await openDatabase(file)
  await migrate(db)
  await db.sequelize.query('PRAGMA wal_checkpoint(TRUNCATE)')
  await db.close()
  await buildServer()
  project.provide('databaseTemplate', file)
  return () => rm(dir, { recursive: true, force: true })
}
