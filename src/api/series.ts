import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Baseline } from '../../shared/schemas/series'
import { call } from './call'

type Statistic = Baseline['statistic']

const chartColumns = ['layerId', 'observedAt', 'day', 'coverage', 'cells', 'valid']

export interface SeriesRequest {
  regionId: number
  feedId: number
  statistic: Statistic
  from?: string
  to?: string
}

/** One statistic of every view: what a chart and its table need, and no more. */
export const seriesQuery = ({ regionId, feedId, statistic, from, to }: SeriesRequest) =>
  queryOptions({
    queryKey: ['regions', regionId, 'series', feedId, statistic, from ?? null, to ?? null],
    queryFn: ({ signal }) =>
      call(endpoints.regionSeries, {
        params: { id: regionId },
        query: { feedId, from, to, columns: [...chartColumns, statistic].join(',') },
        signal,
      }),
    placeholderData: keepPreviousData,
  })

export const baselineQuery = ({ regionId, feedId, statistic }: { regionId: number; feedId: number; statistic?: Statistic }) =>
  queryOptions({
    queryKey: ['regions', regionId, 'baseline', feedId, statistic ?? null],
    queryFn: ({ signal }) =>
      call(endpoints.regionBaseline, { params: { id: regionId }, query: { feedId, statistic }, signal }),
  })

export const eventsQuery = ({ regionId, feedId }: { regionId: number; feedId?: number }) =>
  queryOptions({
    queryKey: ['regions', regionId, 'events', feedId ?? null],
    queryFn: ({ signal }) => call(endpoints.regionEvents, { params: { id: regionId }, query: { feedId }, signal }),
  })

/** Where the same figures are to be had as CSV. */
export function seriesCsvHref(regionId: number, feedId: number): string {
  return `/api/exports/regions/${regionId}/series.csv?feedId=${feedId}`
}
