import { createHash } from 'node:crypto'
import { promisify } from 'node:util'
import { deflate, inflate } from 'node:zlib'
import type { Context } from '../../context'
import type { Transaction } from '../../db'
import { tileCount, wholeGridCells } from '../../grids/decoded/tile-pack'
import { giveWay, moreUrgent } from '../../jobs/give-way'
import { markProgress } from '../../jobs/queue'
import type { FeedRecord } from '../../models/feed'
import type { JobRecord } from '../../models/job'
import { activeGeometries } from '../../queries/geometries'
import { layersById, trustedAmong, type PlacedLayer } from '../../queries/layers'
import type { CellCounts, ComposedMask } from '../../workers/mask-tasks'
import { planOf } from '../../workers/region-cells'
import { cellWeights } from '../cell-weights'
import { placeOf } from '../layer-place'
import { boxesMeet } from '../summarise-layers'

/** Cells counted between two marks of progress, and layers at most. */
const cellsAtOnce = 16 * 1024 * 1024
const mostLayersAtOnce = 62

const [packed, unpacked] = [promisify(deflate), promisify(inflate)]

interface Making {
  id: number
  feedId: number
  gridId: number
  kind: 'valid share' | 'own'
  fromDay: number
  toDay: number
  minShare: number
  layerIds: number[]
  /** The tiles that are counted; null before the first of them is. */
  tiles: number[] | null
  counts: Buffer | null
  askedBy: number | null
}

/**
 * Counts how often each cell was water in the layers settled when the mask was asked for, in small committed batches,
 * then keeps the mask as a new version. A layer that somebody takes back meanwhile makes the counting begin anew.
 */
export async function makeMask(context: Context, job: JobRecord): Promise<'done' | 'paused'> {
  const making = await makingOf(context, Number(job.payload['makingId']))
  const feed = making && (await context.models.feeds.findByPk(making.feedId))
  if (!making || !feed) return 'done'
  let done = job.done
  for (;;) {
    const trusted = await trustedAmong(context, making.layerIds)
    if (trusted.length < making.layerIds.length || making.tiles === null || (done > 0 && making.counts === null)) {
      if (trusted.length === 0) throw new Error('None of the layers this mask was to be made from is left: ask for it anew.')
      making.tiles ??= await tilesToCount(context, making.gridId)
      making.layerIds = trusted
      making.counts = null
      done = 0
      await context.db.write((tx) => keepStart(context, tx, job, making))
    }
    const { layerIds, tiles } = making
    if (done >= layerIds.length) break
    await job.reload()
    if (job.state !== 'running') return 'paused'
    const [sample] = await layersById(context, layerIds.slice(0, 1))
    const batch = await layersById(context, layerIds.slice(done, done + layersAtOnce(sample!)))
    const added = await context.workers.heavy('countCells', {
      kind: making.kind,
      layers: batch.map((layer) => placeOf(context, layer)),
      tiles,
      range: { validMin: feed.validMin, validMax: feed.validMax },
    })
    making.counts = await packedCounts(sumOf(await countsOf(making.counts), added))
    done += batch.length
    await context.db.write(async (tx) => {
      await context.db.run('UPDATE mask_makings SET counts = $counts WHERE id = $id', { id: making.id, counts: making.counts }, tx)
      await markProgress(context, tx, job, done, layerIds.length)
    })
    context.news.tell({ topic: 'feeds', id: feed.id }, { topic: 'jobs', id: job.id })
    if (await moreUrgent(context, job)) return giveWay(context, job)
  }
  await keepMask(context, making, feed)
  context.news.tell({ topic: 'feeds', id: feed.id })
  return 'done'
}

function layersAtOnce({ rows, columns }: PlacedLayer): number {
  return Math.max(1, Math.min(mostLayersAtOnce, Math.floor(cellsAtOnce / (rows * columns))))
}

async function makingOf(context: Context, id: number): Promise<Making | null> {
  const row = await context.db.first<Omit<Making, 'layerIds' | 'tiles'> & { layerIds: string; tiles: string | null }>(
    `SELECT id, feed_id AS feedId, grid_id AS gridId, kind, from_day AS fromDay, to_day AS toDay, min_share AS minShare, layer_ids AS layerIds, tiles, counts,
       asked_by AS askedBy FROM mask_makings WHERE id = $id AND outcome IS NULL`,
    { id },
  )
  return row ? { ...row, layerIds: JSON.parse(row.layerIds) as number[], tiles: row.tiles === null ? null : (JSON.parse(row.tiles) as number[]) } : null
}

async function keepStart(context: Context, tx: Transaction, job: JobRecord, { id, layerIds, tiles }: Making): Promise<void> {
  await context.db.run('UPDATE mask_makings SET layer_ids = $layerIds, tiles = $tiles, counts = NULL WHERE id = $id', { id, layerIds: JSON.stringify(layerIds), tiles: JSON.stringify(tiles) }, tx)
  await markProgress(context, tx, job, 0, layerIds.length)
}

/** All tiles of a grid, or of a very large one those that hold a cell of a region. */
async function tilesToCount(context: Context, gridId: number): Promise<number[]> {
  const grid = await context.db.first<{ rows: number; columns: number; west: number; south: number; east: number; north: number }>(
    'SELECT row_count AS rows, column_count AS columns, west, south, east, north FROM grids WHERE id = $gridId',
    { gridId },
  )
  if (!grid) throw new Error(`There is no grid ${gridId}.`)
  if (grid.rows * grid.columns <= wholeGridCells) return [...Array(tileCount(grid)).keys()]
  const tiles = new Set<number>()
  for (const geometry of await activeGeometries(context)) {
    if (!boxesMeet(geometry, grid)) continue
    for (const tile of planOf(await cellWeights(context, geometry.id, gridId, grid), grid).tiles) tiles.add(tile)
  }
  return [...tiles].sort((a, b) => a - b)
}

async function packedCounts({ water, known }: CellCounts): Promise<Buffer> {
  const both = new Uint32Array(water.length * 2)
  both.set(water)
  both.set(known, water.length)
  return packed(both, { level: 1 })
}

async function countsOf(bytes: Buffer | null): Promise<CellCounts | null> {
  if (bytes === null) return null
  const both = new Uint32Array(new Uint8Array(await unpacked(bytes)).buffer)
  return { water: both.subarray(0, both.length / 2), known: both.subarray(both.length / 2) }
}

function sumOf(before: CellCounts | null, added: CellCounts): CellCounts {
  if (!before) return added
  return { water: before.water.map((count, i) => count + added.water[i]!), known: before.known.map((count, i) => count + added.known[i]!) }
}

/** A mask that is there already, made in the same way of the same period, is no new version. */
async function keepMask(context: Context, making: Making, feed: FeedRecord): Promise<void> {
  const { feedId, gridId, kind, fromDay, toDay, minShare, layerIds } = making
  const grid = await context.db.first<{ definition: string; cells: number }>('SELECT definition, row_count * column_count AS cells FROM grids WHERE id = $gridId', { gridId })
  const tiles = making.tiles ?? []
  const counts = (await countsOf(making.counts))!
  const mask = await context.workers.heavy('composeMask', { grid: grid!.definition, tiles, counts, layers: layerIds.length, kind, minShare, fromDay, toDay })
  const layersChecksum = await checksumOf(context, layerIds)
  const key = { feedId, gridId }
  await context.db.write(async (tx) => {
    const same = await context.db.first<{ id: number }>('SELECT id FROM masks WHERE feed_id = $feedId AND grid_id = $gridId AND checksum = $checksum', { ...key, checksum: mask.checksum }, tx)
    if (!same) {
      await context.db.run(
        `INSERT INTO masks (feed_id, grid_id, version, kind, water, checksum, created_at, from_day, to_day, min_share, layers, layers_checksum, water_cells, gained, lost, note, made_by)
         VALUES ($feedId, $gridId, (SELECT ifnull(max(version), 1) + 1 FROM masks WHERE feed_id = $feedId AND grid_id = $gridId), $kind, $water, $checksum, $at, $fromDay, $toDay, $minShare, $layers,
           $layersChecksum, $waterCells, $gained, $lost, $note, $madeBy)`,
        {
          ...key,
          kind,
          water: Buffer.from(mask.water),
          checksum: mask.checksum,
          at: context.clock.now(),
          fromDay,
          toDay,
          minShare: kind === 'own' ? null : minShare,
          layers: layerIds.length,
          layersChecksum,
          waterCells: mask.waterCells,
          gained: mask.gained,
          lost: mask.lost,
          note: noteOf(mask, kind, grid!.cells, feed),
          madeBy: making.askedBy,
        },
        tx,
      )
    }
    const made = await context.db.first<{ id: number }>('SELECT id FROM masks WHERE feed_id = $feedId AND grid_id = $gridId AND checksum = $checksum', { ...key, checksum: mask.checksum }, tx)
    await context.db.run('UPDATE mask_makings SET outcome = $outcome, mask_id = $maskId, counts = NULL, tiles = NULL WHERE id = $id', { id: making.id, outcome: same ? 'same' : 'made', maskId: made!.id }, tx)
  })
}

/** Names the layers themselves, whatever their ids: the same files give the same in any order of arrival. */
async function checksumOf(context: Context, layerIds: readonly number[]): Promise<string> {
  const names = (await layersById(context, layerIds)).map(({ checksum, variable, step }) => `${checksum} ${step} ${variable}`)
  return createHash('sha256').update(names.sort().join('\n')).digest('hex')
}

function noteOf({ byOutline }: ComposedMask, kind: Making['kind'], cells: number, { name }: FeedRecord): string {
  if (byOutline === 0) return ''
  if (kind === 'own') return `The files of ${name} do not say of ${byOutline} cells whether they are land; there the mask is the land outline.`
  const why = cells > wholeGridCells ? 'The grid is too large to be counted whole: only tiles that hold a region were. ' : ''
  return `${why}${byOutline} cells were not counted; there the mask is the land outline.`
}
