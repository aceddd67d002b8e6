import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import { call } from './call'

export interface ViewRequest {
  regionId: number
  feedId: number
  /** The newest view when left out. */
  day?: string | undefined
  /** The region's own level when left out. */
  level?: number | undefined
}

/** Connected patches of one view; the last ones stay until the next are there. */
export const patchesQuery = ({ regionId, feedId, day, level }: ViewRequest) =>
  queryOptions({
    queryKey: ['regions', regionId, 'patches', feedId, day ?? null, level ?? null],
    queryFn: ({ signal }) => call(endpoints.regionPatches, { params: { id: regionId }, query: { feedId, day, level }, signal }),
    placeholderData: keepPreviousData,
  })

/** Everything kept of one view. */
export const viewQuery = ({ regionId, feedId, day, level }: ViewRequest) =>
  queryOptions({
    queryKey: ['regions', regionId, 'view', feedId, day ?? null, level ?? null],
    queryFn: ({ signal }) => call(endpoints.regionView, { params: { id: regionId }, query: { feedId, day, level }, signal }),
    placeholderData: keepPreviousData,
  })
