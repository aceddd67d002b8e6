import { Umzug } from 'umzug'
import type { Database } from '../db'
import { sql as firstSchema } from './001-first-schema'
import { sql as derivedFeeds } from './002-derived-feeds'
import { sql as feedPulls } from './003-feed-pulls'
import { sql as quality } from './004-quality'
import { sql as madeAndReplaced } from './005-made-and-replaced'
import { sql as outlineVersions } from './006-outline-versions'
import { sql as masks } from './008-masks'
import { sql as jobsByKey } from './009-jobs-by-key'
import { sql as outsideWater } from './010-outside-water'

const migrations = [
  { name: '001-first-schema', sql: firstSchema },
  { name: '002-derived-feeds', sql: derivedFeeds },
  { name: '003-feed-pulls', sql: feedPulls },
  { name: '004-quality', sql: quality },
  { name: '005-made-and-replaced', sql: madeAndReplaced },
  { name: '006-outline-versions', sql: outlineVersions },
  { name: '008-masks', sql: masks },
  { name: '009-jobs-by-key', sql: jobsByKey },
  { name: '010-outside-water', sql: outsideWater },
]

/** Brings the database to the newest schema; answers the names of what was applied. */
export async function migrate(db: Database): Promise<string[]> {
  await db.sequelize.query('CREATE TABLE IF NOT EXISTS migrations (name TEXT PRIMARY KEY) WITHOUT ROWID')
  const umzug = new Umzug({
    migrations: migrations.map(({ name, sql }) => ({ name, up: () => apply(db, name, sql) })),
    storage: {
      // Recorded in the same transaction as the migration itself, in `apply`.
      logMigration: async () => undefined,
      unlogMigration: async () => undefined,
      executed: async () => (await db.all<{ name: string }>('SELECT name FROM migrations ORDER BY name')).map((row) => row.name),
    },
    logger: undefined,
  })
  return (await umzug.up()).map((migration) => migration.name)
}

async function apply(db: Database, name: string, sql: string): Promise<void> {
  await db.write(async (tx) => {
    for (const statement of sql.split(/;\s*\n/).map((part) => part.trim()).filter(Boolean)) {
      await db.sequelize.query(statement, { transaction: tx })
    }
    await db.run('INSERT INTO migrations (name) VALUES ($name)', { name }, tx)
  })
}
