import type { Context } from '../context'
import { softwareVersion } from '../software-version'

/** Small dictionaries asked for with every view; what was found once holds. */
const known = new WeakMap<Context, Map<string, number>>()

export async function maskFor(context: Context, feedId: number, gridId: number): Promise<number> {
  return remembered(context, `mask ${feedId} ${gridId}`, () =>
    context.db.write(async (tx) => {
      await context.db.run(
        `INSERT INTO masks (feed_id, grid_id, version, kind, water, checksum, created_at)
         VALUES ($feedId, $gridId, 1, 'land outline', NULL, 'world-atlas-2.0.2/land-50m', $at) ON CONFLICT DO NOTHING`,
        { feedId, gridId, at: context.clock.now() },
        tx,
      )
      const newest = 'SELECT id FROM masks WHERE feed_id = $feedId AND grid_id = $gridId ORDER BY version DESC LIMIT 1'
      return (await context.db.first<{ id: number }>(newest, { feedId, gridId }, tx))!.id
    }),
  )
}

/** A mask belongs to one feed, and a feed to one formula: the formula needs no place in the key. */
export async function provenanceFor(context: Context, { formula, ...of }: { gridId: number; maskId: number; processingVersion: string; formula: string | null }): Promise<number> {
  const bind = { ...of, softwareVersion }
  return remembered(context, `from ${JSON.stringify(bind)}`, () =>
    context.db.write(async (tx) => {
      await context.db.run(
        `INSERT INTO provenances (grid_id, mask_id, processing_version, software_version, formula)
         VALUES ($gridId, $maskId, $processingVersion, $softwareVersion, $formula) ON CONFLICT DO NOTHING`,
        { ...bind, formula },
        tx,
      )
      const row = await context.db.first<{ id: number }>(
        `SELECT id FROM provenances WHERE grid_id = $gridId AND mask_id = $maskId AND processing_version = $processingVersion
         AND software_version = $softwareVersion`,
        bind,
        tx,
      )
      return row!.id
    }),
  )
}

async function remembered(context: Context, name: string, find: () => Promise<number>): Promise<number> {
  const names = known.get(context) ?? new Map<string, number>()
  known.set(context, names)
  const before = names.get(name)
  if (before !== undefined) return before
  const found = await find()
  names.set(name, found)
  return found
}
