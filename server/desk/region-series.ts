import type { z } from 'zod'
import { epochDayOf } from '../../shared/science/local-day'
import { seriesColumnNames, type Series, type seriesQuery } from '../../shared/schemas/series'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { maskedByReason } from '../queries/masked-by-reason'
import { seriesColumns } from '../queries/series'
import { definitionInForce, regionLevel } from './region-level'

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
    above: regionLevel(feed.unit, await definitionInForce(context, regionId, feed.id), query.above).level,
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
