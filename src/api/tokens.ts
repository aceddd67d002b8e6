import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import type { BodyInputOf } from '../../shared/schemas/endpoint'
import { call } from './call'

export const tokensQuery = () =>
  queryOptions({
    queryKey: ['tokens'],
    queryFn: ({ signal }) => call(endpoints.listTokens, { query: { limit: 500 }, signal }),
  })

export function useCreateToken() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: BodyInputOf<typeof endpoints.createToken>) => call(endpoints.createToken, { body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['tokens'] }),
  })
}

export function useDeleteToken() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (id: number) => call(endpoints.deleteToken, { params: { id } }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['tokens'] }),
  })
}
