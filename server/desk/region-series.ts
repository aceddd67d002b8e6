import type { z } from 'zod'
import { epochDayOf } from '../../shared/science/local-day'
import { seriesColumnNames, type Series, type seriesQuery } from '../../shared/schemas/series'
import type { RuleTest } from '../../shared/science/rule'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { maskedByReason } from '../queries/masked-by-reason'
import { seriesColumns } from '../queries/series'

export type SeriesQuery = z.infer<typeof seriesQuery>

export async function regionSeries(context: Context, regionId: number, query: SeriesQuery): Promise<Series> {
  const region = await context.models.regions.findByPk(regionId)
  if (!region?.geometryId) throw new ApiError('not-found', 'There is no such region.')
  const feed = await context.models.feeds.findByPk(query.feedId)
  if (!feed) throw new ApiError('not-found', 'There is no such feed.')
  const views = {
    geometryId: region.geometryId,
    feedId: feed.id,
    fromDay: query.from === undefined ? null : epochDayOf(query.from),
    toDay: query.to === undefined ? null : epochDayOf(query.to),
  }
  const columns = await seriesColumns(context, {
    ...views,
    columns: columnsAsked(query.columns),
    above: query.above ?? (await absoluteFloor(context, regionId, feed.id)),
  })
  const masked = query.masked === 'true' ? { maskedByReason: await maskedByReason(context, views) } : {}
  return { regionId, feedId: feed.id, unit: feed.unit, columns, ...masked }
}

function columnsAsked(text: string | undefined): (typeof seriesColumnNames)[number][] {
  if (text === undefined || text.trim() === '') return [...seriesColumnNames]
  const names = text.split(',').map((name) => name.trim())
  const unknown = names.filter((name) => !(seriesColumnNames as string[]).includes(name))
  if (unknown.length > 0) throw new ApiError('not-valid', `There is no column ${unknown.join(', ')}. Columns: ${seriesColumnNames.join(', ')}.`)
  return names as (typeof seriesColumnNames)[number][]
}

/** The level a region's rule asks for; 1 in the feed's unit where it asks for none. */
async function absoluteFloor(context: Context, regionId: number, feedId: number): Promise<number> {
  const rule = await context.models.rules.findOne({ where: { regionId, feedId }, order: [['id', 'ASC']] })
  const version = rule?.activeVersion == null ? null : await context.models.ruleVersions.findOne({ where: { ruleId: rule.id, version: rule.activeVersion } })
  return (version && levelOf(version.definition.test)) ?? 1
}

function levelOf(test: RuleTest): number | null {
  if (test.kind === 'above-level') return test.level
  if (test.kind === 'all' || test.kind === 'any') return test.of.map(levelOf).find((level) => level !== null) ?? null
  return null
}
