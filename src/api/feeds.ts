import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import type { BodyInputOf } from '../../shared/schemas/endpoint'
import { call } from './call'

export const feedsQuery = () =>
  queryOptions({
    queryKey: ['feeds'],
    queryFn: ({ signal }) => call(endpoints.listFeeds, { query: { limit: 500 }, signal }),
  })

export const feedQuery = (id: number) =>
  queryOptions({
    queryKey: ['feeds', id],
    queryFn: ({ signal }) => call(endpoints.feed, { params: { id }, signal }),
  })

export type FeedChangeBody = BodyInputOf<typeof endpoints.changeFeed>

export function useCreateFeed() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: BodyInputOf<typeof endpoints.createFeed>) => call(endpoints.createFeed, { body }),
    onSuccess: async () => {
      await client.invalidateQueries({ queryKey: ['files'] })
      await client.invalidateQueries({ queryKey: ['feeds'] })
    },
  })
}

/** Several feeds of one waiting file at once. */
export function useConfirmFeeds(fileId: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: BodyInputOf<typeof endpoints.confirmFeeds>) => call(endpoints.confirmFeeds, { params: { id: fileId }, body }),
    onSuccess: async () => {
      await client.invalidateQueries({ queryKey: ['files'] })
      await client.invalidateQueries({ queryKey: ['feeds'] })
    },
  })
}

export function useChangeFeed(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: FeedChangeBody) => call(endpoints.changeFeed, { params: { id }, body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['feeds'] }),
  })
}
