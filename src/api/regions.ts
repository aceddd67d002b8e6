import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import type { BodyInputOf } from '../../shared/schemas/endpoint'
import { call } from './call'

export const regionsQuery = () =>
  queryOptions({
    queryKey: ['regions'],
    queryFn: ({ signal }) => call(endpoints.listRegions, { query: { limit: 500 }, signal }),
  })

export const regionQuery = (id: number) =>
  queryOptions({
    queryKey: ['regions', id],
    queryFn: ({ signal }) => call(endpoints.region, { params: { id }, signal }),
  })

export type NewRegionBody = BodyInputOf<typeof endpoints.createRegion>
export type RegionChangeBody = BodyInputOf<typeof endpoints.changeRegion>

export function useCreateRegion() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: NewRegionBody) => call(endpoints.createRegion, { body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['regions'] }),
  })
}

export function useChangeRegion(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: RegionChangeBody) => call(endpoints.changeRegion, { params: { id }, body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['regions'] }),
  })
}

export function useRetireRegion(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () => call(endpoints.retireRegion, { params: { id } }),
    onSuccess: async () => {
      client.removeQueries({ queryKey: ['regions', id] })
      await client.invalidateQueries({ queryKey: ['regions'], exact: true })
    },
  })
}
