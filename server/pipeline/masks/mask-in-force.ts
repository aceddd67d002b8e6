import { promisify } from 'node:util'
import { inflate } from 'node:zlib'
import { bitAt } from '../../../shared/science/water-mask'
import { wholeWaterCells } from '../../../shared/science/whole-water'
import type { Context } from '../../context'
import type { Transaction } from '../../db'
import { BoundedCache } from '../../pictures/bounded-cache'
import { chosenMask, masksOf, maskWater } from '../../queries/masks'
import type { RegionCellWeights } from '../../workers/tasks'
import { cellWeights, type GridSize } from '../cell-weights'

/** Which cells of a grid are water for one feed. Masks never change. */
export interface KnownMask {
  id: number
  gridId: number
}

const inflated = promisify(inflate)
const mostBytes = 64 * 1024 * 1024
const bitsOf = new WeakMap<Context, BoundedCache<Uint8Array | null>>()

/** The mask somebody put in force, else the land outline, which is version 1 of every feed and grid. */
export async function maskInForce(context: Context, feedId: number, gridId: number, tx?: Transaction): Promise<KnownMask> {
  const chosen = await chosenMask(context, feedId, gridId, tx)
  return { id: chosen?.maskId ?? (await outlineMask(context, feedId, gridId, tx)), gridId }
}

/** "valid share, version 2": as an alert's evidence names a mask. */
export function maskText({ kind, version }: { kind: string; version: number }): string {
  return `${kind}, version ${version}`
}

/** The mask an alert's evidence names; null when the view lies on another grid now, which has no such mask. */
export async function maskNamed(context: Context, feedId: number, gridId: number, text: string): Promise<KnownMask | null> {
  const mask = (await masksOf(context, feedId, gridId)).find((one) => maskText(one) === text)
  return mask ? { id: mask.id, gridId } : null
}

async function outlineMask(context: Context, feedId: number, gridId: number, within?: Transaction): Promise<number> {
  const find = 'SELECT id FROM masks WHERE feed_id = $feedId AND grid_id = $gridId AND version = 1'
  const known = await context.db.first<{ id: number }>(find, { feedId, gridId }, within)
  if (known) return known.id
  const add = async (tx: Transaction) => {
    await context.db.run(
      `INSERT INTO masks (feed_id, grid_id, version, kind, water, checksum, created_at)
       VALUES ($feedId, $gridId, 1, 'land outline', NULL, 'world-atlas-2.0.2/land-50m', $at) ON CONFLICT DO NOTHING`,
      { feedId, gridId, at: context.clock.now() },
      tx,
    )
    return (await context.db.first<{ id: number }>(find, { feedId, gridId }, tx))!.id
  }
  return within ? add(within) : context.db.write(add)
}

/** A bit a cell of the grid; null for the land outline, which is kept with the weights of each region. */
export function maskBits(context: Context, maskId: number): Promise<Uint8Array | null> {
  const kept = bitsOf.get(context) ?? new BoundedCache<Uint8Array | null>(mostBytes, (bits) => 100 + (bits?.length ?? 0))
  bitsOf.set(context, kept)
  return kept.get(String(maskId), async () => {
    const packed = await maskWater(context, maskId)
    return packed && inflated(packed)
  })
}

/** The cells of a region with the water of a mask. */
export async function maskedWeights(context: Context, geometryId: number, mask: KnownMask, size: GridSize): Promise<RegionCellWeights> {
  const weights = await cellWeights(context, geometryId, mask.gridId, size)
  const bits = await maskBits(context, mask.id)
  return bits ? { ...weights, water: waterIn(bits, weights.index) } : weights
}

export function waterIn(bits: Uint8Array, index: Uint32Array): Uint8Array {
  return Uint8Array.from(index, (cell) => bitAt(bits, cell))
}

/** Notes, for a standing to say, how many whole water cells a region has by a mask. That of the outline stands with the weights. */
export async function noteWholeWater(context: Context, geometryId: number, mask: KnownMask, weights: RegionCellWeights): Promise<void> {
  if ((await maskBits(context, mask.id)) === null) return
  const bind = { geometryId, maskId: mask.id }
  if (await context.db.first('SELECT 1 AS one FROM region_masks WHERE geometry_id = $geometryId AND mask_id = $maskId', bind)) return
  const insert = 'INSERT INTO region_masks (geometry_id, mask_id, whole_water) VALUES ($geometryId, $maskId, $wholeWater) ON CONFLICT DO NOTHING'
  await context.db.write((tx) => context.db.run(insert, { ...bind, wholeWater: wholeWaterCells(weights) }, tx))
}
