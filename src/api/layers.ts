import { infiniteQueryOptions, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import { call } from './call'

export interface LayersRequest {
  feedId?: number
  from?: string
  to?: string
}

export const layersQuery = ({ feedId, from, to }: LayersRequest) =>
  infiniteQueryOptions({
    queryKey: ['layers', 'list', feedId ?? null, from ?? null, to ?? null],
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listLayers, { query: { limit: 50, cursor: pageParam, feedId, from, to }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  })

export const layerQuery = (id: number) =>
  queryOptions({
    queryKey: ['layers', 'one', id],
    queryFn: ({ signal }) => call(endpoints.layer, { params: { id }, signal }),
  })

export function useMarkSuspect(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: { suspect: boolean; note: string }) => call(endpoints.markLayerSuspect, { params: { id }, body }),
    onSuccess: async () => {
      await client.invalidateQueries({ queryKey: ['layers'] })
      await client.invalidateQueries({ queryKey: ['regions'] })
    },
  })
}
