import { rename } from 'node:fs/promises'
import { join } from 'node:path'
import type { Context } from '../../context'
import { keepSetting, settingOf } from '../../queries/settings'
import { filesOf } from './files'

const dayMs = 86_400_000
const arrivalHour = 15

/** Drops the layers of every day that has come since the last one into the watched folder. */
export async function deliverNewDays(context: Context): Promise<void> {
  const { clock, db, env } = context
  const newest = Math.floor((clock.now() - arrivalHour * 3_600_000) / dayMs)
  const last = Number(await settingOf(db, 'demo-last-day'))
  for (let day = last + 1; day <= newest; day++) {
    for (const file of filesOf(day)) {
      const path = await context.workers.light('writeDemoFile', { file, directory: env.dataDir })
      await rename(path, join(env.dataDir, 'inbox', file.name))
    }
    await db.write((tx) => keepSetting(db, tx, 'demo-last-day', String(day)))
  }
}
