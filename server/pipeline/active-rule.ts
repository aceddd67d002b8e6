import type { RuleDefinition } from '../../shared/science/rule'
import type { Context } from '../context'
import type { FeedRow } from '../models/feed'
import type { GeometryRow } from '../models/geometry'
import type { RegionRow } from '../models/region'
import type { RuleRow } from '../models/rule'

/** A rule that is switched on, with all it speaks of. */
export interface Subject {
  rule: RuleRow
  ruleVersion: number
  definition: RuleDefinition
  region: RegionRow
  geometry: GeometryRow
  feed: FeedRow
}

export async function activeRule(context: Context, ruleId: number): Promise<Subject | null> {
  const { models } = context
  const rule = await models.rules.findByPk(ruleId)
  if (!rule || rule.activeVersion === null) return null
  const version = await models.ruleVersions.findOne({ where: { ruleId, version: rule.activeVersion } })
  const region = await models.regions.findByPk(rule.regionId)
  const geometry = region?.geometryId ? await models.geometries.findByPk(region.geometryId) : null
  const feed = await models.feeds.findByPk(rule.feedId)
  if (!version || !region || region.retiredAt !== null || !geometry || !feed) return null
  return { rule, ruleVersion: version.version, definition: version.definition, region, geometry, feed }
}
