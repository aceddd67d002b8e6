import type { z } from 'zod'
import { seasonalBaseline } from '../../shared/science/baseline'
import { isUsable } from '../../shared/science/judge-view'
import { localSolarDay, yearOf } from '../../shared/science/local-day'
import { compareVersions } from '../../shared/science/merge-views'
import { defaultRule } from '../../shared/science/rule'
import type { Baseline, baselineQuery } from '../../shared/schemas/series'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { halfWidthDays as storedHalfWidth, smoothingDays as storedSmoothing } from '../pipeline/keep-baseline'
import { newestBaseline } from '../queries/baselines'
import { judgeableViews } from '../queries/judgeable-views'
import { yearsAsked } from './years-asked'

/** The stored baseline; or one computed for the asking, when other settings or years are wanted, or none is stored. */
export async function regionBaseline(context: Context, regionId: number, query: z.infer<typeof baselineQuery>): Promise<Baseline> {
  const region = await context.models.regions.findByPk(regionId)
  const geometry = region?.geometryId ? await context.models.geometries.findByPk(region.geometryId) : null
  if (!region || !geometry) throw new ApiError('not-found', 'There is no such region.')
  const rule = await context.models.rules.findOne({ where: { regionId, feedId: query.feedId }, order: [['id', 'ASC']] })
  const version = rule?.activeVersion == null ? null : await context.models.ruleVersions.findOne({ where: { ruleId: rule.id, version: rule.activeVersion } })
  const definition = version?.definition ?? defaultRule()
  const statistic = query.statistic ?? (definition.statistic === 'departure' ? 'median' : definition.statistic)
  const halfWidthDays = query.halfWidthDays ?? storedHalfWidth
  const smoothingDays = query.smoothingDays ?? storedSmoothing
  const asIs = query.years === undefined && halfWidthDays === storedHalfWidth && smoothingDays === storedSmoothing
  const stored = asIs ? await newestBaseline(context, geometry.id, query.feedId, statistic) : null
  const answer = { regionId, feedId: query.feedId, statistic, halfWidthDays, smoothingDays }
  if (stored) return { ...answer, version: stored.version, years: stored.years, columns: stored.columns }
  const views = (await judgeableViews(context, geometry.id, query.feedId)).filter((view) => isUsable(view, { ...definition, statistic }))
  const newest = views.map((view) => view.processingVersion).reduce((a, b) => (compareVersions(a, b) >= 0 ? a : b), '')
  const thisYear = yearOf(localSolarDay(context.clock.now(), geometry.centreLongitude))
  const wanted = query.years === undefined ? null : yearsAsked(query.years)
  const made = views.filter((view) => {
    const year = yearOf(view.day)
    return view.processingVersion === newest && (wanted ? wanted.has(year) : year < thisYear)
  })
  const years = [...new Set(made.map((view) => yearOf(view.day)))].sort((a, b) => a - b)
  const columns = seasonalBaseline({
    days: Int32Array.from(made, (view) => view.day),
    values: Float64Array.from(made, (view) => view.statistics[statistic] ?? NaN),
    fromYear: years[0] ?? thisYear,
    toYear: years.at(-1) ?? thisYear,
    halfWidthDays,
    smoothingDays,
  })
  return { ...answer, version: null, years, columns }
}
