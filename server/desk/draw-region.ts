import type { z } from 'zod'
import type { newRegion, regionChange } from '../../shared/schemas/regions'
import { audit } from '../accounts/audit'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { GeometryRow } from '../models/geometry'
import type { RegionRecord } from '../models/region'
import { queueBackfill } from '../pipeline/backfill-region'
import { checkedGeometry, type CheckedOutline } from './checked-geometry'
import { endRunningEvents } from './redraw'

/** A new region: its outline checked, then kept with its first geometry version, and its history queued. */
export async function drawRegion(context: Context, person: Person, drawn: z.infer<typeof newRegion>): Promise<RegionRecord> {
  const checked = await checkedGeometry(context, drawn.geometry, drawn.inland)
  const region = await context.db.write(async (tx) => {
    if (drawn.feedId !== undefined) await knownFeed(context, tx, drawn.feedId)
    const { name, timeZone, site, contacts, shoreBufferKm, opticallyComplex } = drawn
    const record = await context.models.regions.create(
      { name, timeZone, site, contacts, shoreBufferKm, opticallyComplex, wantedFeedId: drawn.feedId ?? null, createdBy: person.id, createdAt: context.clock.now() },
      { transaction: tx },
    )
    await keepGeometry(context, tx, record, checked, 1, person)
    await audit(context, tx, { userId: person.id, action: 'region:draw', subject: `region ${record.id}`, details: { name, areaKm2: checked.areaKm2 } })
    return record
  })
  context.news.tell({ topic: 'regions', id: region.id }, { topic: 'jobs' })
  context.wake()
  return region
}

/** Changes a region; another outline or shore buffer is a new version, whose history is read anew behind it. */
export async function changeRegion(context: Context, person: Person, id: number, change: z.infer<typeof regionChange>): Promise<RegionRecord> {
  const { version, geometry, inland, confirm, ...fields } = change
  const checked = geometry === undefined ? null : await checkedGeometry(context, geometry, inland)
  const region = await context.db.write(async (tx) => {
    const record = await liveRegion(context, tx, id)
    if (record.version !== version) throw new ApiError('stale-version', 'Somebody else changed this region meanwhile. Look at it again.', { version: record.version })
    const before = record.geometryId === null ? null : await context.models.geometries.findByPk(record.geometryId, { transaction: tx })
    const moved = checked !== null && JSON.stringify(checked.geometry) !== JSON.stringify(before?.geometry)
    const shoreBufferKm = fields.shoreBufferKm ?? before?.shoreBufferKm ?? 0
    const outline = moved || !before ? checked : shoreBufferKm === before.shoreBufferKm ? null : outlineOf(before)
    if (outline) {
      const next = { regionId: id, version: (before?.version ?? 0) + 1, confirmed: confirm, person }
      await endRunningEvents(context, tx, next)
      await record.update({ ...fields, shoreBufferKm, version: version + 1 }, { transaction: tx })
      await keepGeometry(context, tx, record, outline, next.version, person)
    } else await record.update({ ...fields, version: version + 1 }, { transaction: tx })
    await audit(context, tx, { userId: person.id, action: 'region:change', subject: `region ${id}`, details: { fields: Object.keys(fields), outline: moved, shoreBufferKm } })
    return record
  })
  context.news.tell({ topic: 'regions', id: region.id }, { topic: 'jobs' })
  context.wake()
  return region
}

/** Takes a region off the desk; its figures and alerts stay. An open alert has to be closed first. */
export async function retireRegion(context: Context, person: Person, id: number): Promise<void> {
  await context.db.write(async (tx) => {
    const record = await liveRegion(context, tx, id)
    const open = await context.db.first<{ id: number }>(`SELECT id FROM alerts WHERE region_id = $id AND state <> 'closed'`, { id }, tx)
    if (open) throw new ApiError('conflict', `Alert ${open.id} is open over this region. Close it first.`, { alertId: open.id })
    await record.update({ retiredAt: context.clock.now(), version: record.version + 1 }, { transaction: tx })
    await audit(context, tx, { userId: person.id, action: 'region:retire', subject: `region ${id}`, details: { name: record.name } })
  })
  context.news.tell({ topic: 'regions', id })
}

type KeptOutline = Pick<CheckedOutline, 'geometry' | 'repairs' | 'areaKm2' | 'box' | 'centreLongitude'>

/** The outline in force again, for a version that differs in something else. */
function outlineOf({ geometry, repairs, areaKm2, west, south, east, north, centreLongitude }: GeometryRow): KeptOutline {
  return { geometry, repairs, areaKm2, box: { west, south, east, north }, centreLongitude }
}

async function keepGeometry(context: Context, tx: Transaction, region: RegionRecord, checked: KeptOutline, version: number, person: Person): Promise<void> {
  const geometry = await context.models.geometries.create(
    {
      regionId: region.id,
      version,
      geometry: checked.geometry,
      repairs: checked.repairs,
      areaKm2: checked.areaKm2,
      shoreBufferKm: region.shoreBufferKm,
      ...checked.box,
      centreLongitude: checked.centreLongitude,
      createdBy: person.id,
      createdAt: context.clock.now(),
    },
    { transaction: tx },
  )
  await region.update({ geometryId: geometry.id }, { transaction: tx })
  await queueBackfill(context, tx, { id: region.id, name: region.name, geometryId: geometry.id })
}

export async function liveRegion(context: Context, tx: Transaction | undefined, id: number): Promise<RegionRecord> {
  const record = await context.models.regions.findByPk(id, tx ? { transaction: tx } : {})
  if (!record || record.retiredAt !== null) throw new ApiError('not-found', 'There is no such region.')
  return record
}

async function knownFeed(context: Context, tx: Transaction, id: number): Promise<void> {
  const feed = await context.models.feeds.findByPk(id, { transaction: tx })
  if (!feed || feed.retired) throw new ApiError('not-valid', 'There is no such feed.', { fields: { feedId: 'There is no such feed.' } })
}
