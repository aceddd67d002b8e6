import { readdir, rm, stat } from 'node:fs/promises'
import { join } from 'node:path'
import type { Context } from '../context'
import { layersById } from '../queries/layers'
import { decodedFolder, packPath } from './decoded-layers'

const layersAtOnce = 500
/** Younger ones may belong to a layer whose row is not written yet. */
const spareMs = 3_600_000

/** Takes away decoded tiles that no layer asks for any more: of deleted files, earlier settings and earlier versions of Offing. */
export async function sweepDecoded(context: Context): Promise<number> {
  const wanted = await wantedPacks(context)
  const folder = decodedFolder(context.env)
  let removed = 0
  for (const part of await readdir(folder).catch(() => [])) {
    for (const name of await readdir(join(folder, part))) {
      const path = join(folder, part, name)
      if (wanted.has(path)) continue
      const found = await stat(path).catch(() => null)
      if (!found || context.clock.system() - found.mtimeMs < spareMs) continue
      await rm(path, { force: true })
      removed++
    }
  }
  return removed
}

async function wantedPacks(context: Context): Promise<Set<string>> {
  const packs = new Set<string>()
  const ids = (await context.db.all<{ id: number }>('SELECT id FROM layers ORDER BY id')).map(({ id }) => id)
  for (let from = 0; from < ids.length; from += layersAtOnce) {
    for (const layer of await layersById(context, ids.slice(from, from + layersAtOnce))) packs.add(packPath(context.env, layer))
  }
  return packs
}
