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

export const layerLegendQuery = (id: number) =>
  queryOptions({
    queryKey: ['layers', 'legend', id],
    queryFn: ({ signal }) => call(endpoints.layerLegend, { params: { id }, signal }),
    staleTime: 60_000,
  })

/** One cell of a layer; with what is usual there when asked, which takes longer. */
export const layerPointQuery = (id: number, place: { latitude: number; longitude: number }, usual: boolean) =>
  queryOptions({
    queryKey: ['layers', 'point', id, place.latitude, place.longitude, usual],
    queryFn: ({ signal }) =>
      call(endpoints.layerPoint, { params: { id }, query: { lat: place.latitude, lon: place.longitude, usual: usual ? 'true' : 'false' }, signal }),
    staleTime: 60_000,
  })

export const feedDaysQuery = (feedId: number, from: string, to: string) =>
  queryOptions({
    queryKey: ['layers', 'days', feedId, from, to],
    queryFn: ({ signal }) => call(endpoints.feedDays, { params: { id: feedId }, query: { from, to }, signal }),
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
