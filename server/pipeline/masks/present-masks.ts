import { dateOf } from '../../../shared/science/local-day'
import type { FeedMasks, GridMasks, MaskMaking, WaterMaskShown } from '../../../shared/schemas/masks'
import { ApiError } from '../../api-error'
import type { Context } from '../../context'
import { wholeGridCells } from '../../grids/decoded/tile-pack'
import { chosenMask, gridsOfFeed, masksOf, type ChosenMask, type LayersOnGrid, type MaskRow } from '../../queries/masks'
import { fullYears } from './full-years'
import { maskInForce } from './mask-in-force'
import { ownMarks } from './own-marks'
import { maskJobKey } from './queue-mask'

const dayMs = 86_400_000
const iso = (at: number) => new Date(at).toISOString()
const dayOrNull = (day: number | null) => (day === null ? null : dateOf(day))

export async function presentMasks(context: Context, feedId: number): Promise<FeedMasks> {
  if ((await context.models.feeds.count({ where: { id: feedId } })) === 0) throw new ApiError('not-found', 'There is no such feed.')
  const items: GridMasks[] = []
  for (const grid of await gridsOfFeed(context, feedId)) items.push(await presentGrid(context, feedId, grid))
  const remaking = await context.db.first<NonNullable<FeedMasks['remaking']>>(
    `SELECT state, done, total FROM jobs WHERE state <> 'done' AND id = (SELECT max(id) FROM jobs WHERE kind = 'backfill-feed' AND job_key = $key)`,
    { key: String(feedId) },
  )
  return { feedId, items, nextCursor: null, remaking: remaking ?? null }
}

async function presentGrid(context: Context, feedId: number, { newestLayerId, oldest, newest, ...grid }: LayersOnGrid): Promise<GridMasks> {
  const { id: inForce } = await maskInForce(context, feedId, grid.gridId)
  const chosen = await chosenMask(context, feedId, grid.gridId)
  const years = fullYears(Math.floor(oldest / dayMs), Math.floor(context.clock.now() / dayMs))
  return {
    ...grid,
    oldest: iso(oldest).slice(0, 10),
    newest: iso(newest).slice(0, 10),
    fullYears: years && { from: dateOf(years.fromDay), to: dateOf(years.toDay) },
    own: await ownMarks(context, newestLayerId),
    watchedOnly: grid.rows * grid.columns > wholeGridCells,
    masks: (await masksOf(context, feedId, grid.gridId)).map((mask) => presentMask(mask, inForce, chosen)),
    making: await makingOf(context, feedId, grid.gridId),
  }
}

function presentMask({ id, version, kind, fromDay, toDay, minShare, layers, waterCells, gained, lost, note, checksum, madeBy, createdAt }: MaskRow, inForce: number, chosen: ChosenMask | undefined): WaterMaskShown {
  const isChosen = chosen?.maskId === id
  return {
    id,
    version,
    kind,
    inForce: id === inForce,
    from: dayOrNull(fromDay),
    to: dayOrNull(toDay),
    minShare,
    layers,
    waterCells,
    gained,
    lost,
    note,
    checksum,
    madeBy,
    madeAt: iso(createdAt),
    inForceBy: isChosen ? chosen.by : null,
    inForceSince: isChosen ? iso(chosen.since) : null,
  }
}

async function makingOf(context: Context, feedId: number, gridId: number): Promise<MaskMaking | null> {
  const row = await context.db.first<{ kind: MaskMaking['kind']; fromDay: number; toDay: number; layers: number; by: string | null; askedAt: number; outcome: MaskMaking['outcome']; version: number | null }>(
    `SELECT k.kind, k.from_day AS fromDay, k.to_day AS toDay, json_array_length(k.layer_ids) AS layers, u.name AS by, k.asked_at AS askedAt, k.outcome, m.version
     FROM mask_makings k LEFT JOIN users u ON u.id = k.asked_by LEFT JOIN masks m ON m.id = k.mask_id WHERE k.feed_id = $feedId AND k.grid_id = $gridId`,
    { feedId, gridId },
  )
  if (!row) return null
  const { fromDay, toDay, askedAt, ...rest } = row
  const job = await context.db.first<NonNullable<MaskMaking['job']>>(
    `SELECT id, state, done, total, last_error AS lastError FROM jobs WHERE kind = 'make-mask' AND job_key = $key ORDER BY id DESC LIMIT 1`,
    { key: maskJobKey(feedId, gridId) },
  )
  return { ...rest, from: dateOf(fromDay), to: dateOf(toDay), askedAt: iso(askedAt), job: job ?? null }
}
