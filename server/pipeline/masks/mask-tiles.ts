import { createHash } from 'node:crypto'
import { ApiError } from '../../api-error'
import type { Context } from '../../context'
import { BoundedCache } from '../../pictures/bounded-cache'
import { maskById, maskWater } from '../../queries/masks'
import type { Tile } from '../layer-pictures'

/** Raised when the same mask is to look different. */
const pictureVersion = 1
const mostBytes = 8 * 1024 * 1024
const keptOf = new WeakMap<Context, BoundedCache<Uint8Array | null>>()

/** A tile of a mask, and its tag, which never changes: a mask does not. */
export async function maskTile(context: Context, id: number, tile: Tile): Promise<{ tag: string; picture: () => Promise<Uint8Array | null> }> {
  const mask = await maskById(context, id)
  if (!mask) throw new ApiError('not-found', 'There is no such water mask.')
  const key = JSON.stringify([pictureVersion, mask.gridId, mask.checksum, tile])
  const kept = keptOf.get(context) ?? new BoundedCache<Uint8Array | null>(mostBytes, (picture) => 500 + (picture?.length ?? 0))
  keptOf.set(context, kept)
  return {
    tag: `"${createHash('sha1').update(key).digest('base64url')}"`,
    picture: () =>
      kept.get(key, async () => {
        const grid = await context.db.first<{ definition: string }>('SELECT definition FROM grids WHERE id = $id', { id: mask.gridId })
        return context.workers.light('drawMaskTile', { grid: grid!.definition, water: await maskWater(context, id), ...tile })
      }),
  }
}
