import type { z } from 'zod'
import type { RegionView, viewQuery } from '../../shared/schemas/patches'
import { awayFrom } from '../geography/geodesic'
import { areaAboveKm2, binsInUse, unpackHistogram } from '../../shared/science/histogram'
import { dateOf, epochDayOf } from '../../shared/science/local-day'
import type { Context } from '../context'
import { daysAround, reasonsOf, storedView, type StoredFigures } from '../queries/stored-views'
import { waterAreaKm2 } from './view-patches'
import { viewSubject, type ViewSubject } from './view-subject'

/** Everything kept of one view of a region: nothing is read from its layers. */
export async function regionView(context: Context, regionId: number, query: z.infer<typeof viewQuery>): Promise<RegionView> {
  const subject = await viewSubject(context, regionId, query)
  const { geometry, feed, level } = subject
  const of = { geometryId: geometry.id, feedId: feed.id }
  const view = await storedView(context, of, query.day === undefined ? null : epochDayOf(query.day))
  const days = await daysAround(context, of, view?.day ?? (query.day === undefined ? null : epochDayOf(query.day)))
  const date = (day: number | null) => (day === null ? null : dateOf(day))
  return {
    regionId,
    feedId: feed.id,
    unit: feed.unit,
    scale: feed.scale,
    level,
    first: date(days.first),
    last: date(days.last),
    previous: date(days.previous),
    next: date(days.next),
    view: view ? await presentView(context, subject, view) : null,
  }
}

async function presentView(context: Context, { region, geometry, feed, level }: ViewSubject, view: StoredFigures): Promise<RegionView['view']> {
  const { day, observedAt, endsAt, histogram: packed, max, maxLat, maxLon, maskId: _, ...figures } = view
  const histogram = unpackHistogram(packed)
  const waterKm2 = await waterAreaKm2(context, geometry.id, view)
  const reasons = await reasonsOf(context, { geometryId: geometry.id, feedId: feed.id }, day)
  const { site } = region
  return {
    ...figures,
    day: dateOf(day),
    observedAt: new Date(observedAt).toISOString(),
    endsAt: endsAt === null ? null : new Date(endsAt).toISOString(),
    waterAreaKm2: waterKm2,
    max:
      max === null || maxLat === null || maxLon === null
        ? null
        : { value: max, latitude: maxLat, longitude: maxLon, away: site && awayFrom([site.longitude, site.latitude], [maxLon, maxLat]) },
    histogram: binsInUse(histogram),
    areaAboveKm2: areaAboveKm2(histogram, level.level),
    masked: reasons.map(({ reason, areaKm2 }) => ({ reason, areaKm2, share: waterKm2 > 0 ? Math.min(1, areaKm2 / waterKm2) : 0 })),
  }
}
