import { epochDayOf } from '../../shared/science/local-day'
import type { FeedDays } from '../../shared/schemas/layers'
import type { Context } from '../context'

const dayMs = 86_400_000
const dayText = (instant: number) => new Date(instant).toISOString().slice(0, 10)

export async function oldestLayerAt(context: Context, feedId: number): Promise<number | null> {
  const row = await context.db.first<{ oldest: number | null }>('SELECT min(observed_at) AS oldest FROM layers WHERE feed_id = $feedId', { feedId })
  return row?.oldest ?? null
}

/** The days of a feed that have layers, those that a newer file replaced left out; the first and last day are those of the whole feed, whatever is asked for. */
export async function feedDays(context: Context, feedId: number, { from, to }: { from?: string | undefined; to?: string | undefined }): Promise<FeedDays> {
  const span = await context.db.first<{ first: number | null; last: number | null }>(
    'SELECT min(observed_at) AS first, max(observed_at) AS last FROM layers WHERE feed_id = $feedId',
    { feedId },
  )
  const rows = await context.db.all<{ id: number; observedAt: number; endsAt: number | null; hasClock: number; suspectAt: number | null }>(
    `SELECT id, observed_at AS observedAt, ends_at AS endsAt, has_clock AS hasClock, suspect_at AS suspectAt FROM layers
     WHERE feed_id = $feedId AND replaced_by IS NULL AND ($from IS NULL OR observed_at >= $from) AND ($to IS NULL OR observed_at < $to) ORDER BY observed_at, id`,
    { feedId, from: from === undefined ? null : epochDayOf(from) * dayMs, to: to === undefined ? null : (epochDayOf(to) + 1) * dayMs },
  )
  const days = new Map<string, FeedDays['days'][number]>()
  for (const { id, observedAt, endsAt, hasClock, suspectAt } of rows) {
    const day = dayText(observedAt)
    const held = days.get(day) ?? { day, layers: [] }
    held.layers.push({ id, observedAt: new Date(observedAt).toISOString(), endsAt: endsAt === null ? null : new Date(endsAt).toISOString(), hasClock: hasClock === 1, suspect: suspectAt !== null })
    days.set(day, held)
  }
  const ends = span && span.first !== null && span.last !== null ? { first: dayText(span.first), last: dayText(span.last) } : { first: null, last: null }
  return { feedId, ...ends, days: [...days.values()] }
}
