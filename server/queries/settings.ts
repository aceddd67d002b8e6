import type { Database, Transaction } from '../db'

export type SettingName = 'clock-offset' | 'demo' | 'demo-last-day' | 'tidied-at'

export async function settingOf(db: Database, name: SettingName): Promise<string | null> {
  return (await db.first<{ value: string }>('SELECT value FROM settings WHERE name = $name', { name }))?.value ?? null
}

export async function keepSetting(db: Database, tx: Transaction, name: SettingName, value: string): Promise<void> {
  await db.run('INSERT INTO settings (name, value) VALUES ($name, $value) ON CONFLICT (name) DO UPDATE SET value = excluded.value', { name, value }, tx)
}
