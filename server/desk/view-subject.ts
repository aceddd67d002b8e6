import type { ShownLevel } from '../../shared/schemas/patches'
import type { Place } from '../geography/geodesic'
import type { RuleDefinition } from '../../shared/science/rule'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { FeedRow } from '../models/feed'
import type { GeometryRow } from '../models/geometry'
import type { RegionRow } from '../models/region'
import { definitionInForce, regionLevel } from './region-level'

/** A region with the outline and rule in force, as one feed sees it, at a level. */
export interface ViewSubject {
  region: RegionRow
  geometry: GeometryRow
  feed: FeedRow
  definition: RuleDefinition | null
  level: ShownLevel
}

export async function viewSubject(context: Context, regionId: number, { feedId, level }: { feedId: number; level?: number | undefined }): Promise<ViewSubject> {
  const { models } = context
  const region = await models.regions.findByPk(regionId)
  const geometry = region?.geometryId ? await models.geometries.findByPk(region.geometryId) : null
  if (!region || !geometry) throw new ApiError('not-found', 'There is no such region.')
  const feed = await models.feeds.findByPk(feedId)
  if (!feed) throw new ApiError('not-found', 'There is no such feed.')
  const rule = await definitionInForce(context, regionId, feedId)
  return {
    region: region.get({ plain: true }),
    geometry: geometry.get({ plain: true }),
    feed: feed.get({ plain: true }),
    definition: rule?.definition ?? null,
    level: regionLevel(feed.unit, rule, level),
  }
}

export const placeWords = ([longitude, latitude]: Place) => ({ latitude, longitude })
