import type { Context } from '../context'
import { softwareVersion } from '../software-version'

/** Small dictionaries asked for with every view; what was found once holds. */
const known = new WeakMap<Context, Map<string, number>>()

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
