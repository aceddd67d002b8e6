import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { BodyInputOf } from '../../shared/schemas/endpoint'
import { endpoints } from '../../shared/schemas/endpoints'
import type { FeedPull } from '../../shared/schemas/pulls'
import { call } from './call'

const whileRunningMs = 3_000

export const pullQuery = (feedId: number) =>
  queryOptions({
    queryKey: ['feeds', feedId, 'pull'],
    queryFn: ({ signal }) => call(endpoints.feedPull, { params: { id: feedId }, signal }),
    // The stream tells when it is done; this is for when the stream is down.
    refetchInterval: ({ state }) => (state.data?.running ? whileRunningMs : false),
  })

export type PullBody = BodyInputOf<typeof endpoints.keepPull>

function usePullChange<T>(feedId: number, change: (given: T) => Promise<FeedPull>) {
  const client = useQueryClient()
  return useMutation({ mutationFn: change, onSuccess: (pull) => client.setQueryData(pullQuery(feedId).queryKey, pull) })
}

export function useKeepPull(feedId: number) {
  return usePullChange(feedId, (body: PullBody) => call(endpoints.keepPull, { params: { id: feedId }, body }))
}

export function usePullNow(feedId: number) {
  return usePullChange(feedId, () => call(endpoints.pullNow, { params: { id: feedId } }))
}

export function useDropPull(feedId: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () => call(endpoints.dropPull, { params: { id: feedId } }),
    onSuccess: () => client.invalidateQueries({ queryKey: pullQuery(feedId).queryKey }),
  })
}
