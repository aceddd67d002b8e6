import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { BodyInputOf } from '../../shared/schemas/endpoint'
import { endpoints } from '../../shared/schemas/endpoints'
import type { FeedMasks, MaskMaking } from '../../shared/schemas/masks'
import { call } from './call'

const whileMakingMs = 3_000

/** Whether a mask is on its way. */
export function isMaking(making: MaskMaking | null): boolean {
  return making !== null && making.outcome === null && (making.job?.state === 'waiting' || making.job?.state === 'running' || making.job?.state === 'paused')
}

export const feedMasksQuery = (feedId: number) =>
  queryOptions({
    queryKey: ['feeds', feedId, 'masks'],
    queryFn: ({ signal }) => call(endpoints.feedMasks, { params: { id: feedId }, signal }),
    // The stream tells how far it is; this is for when the stream is down.
    refetchInterval: ({ state: { data } }) => (data?.remaking?.state === 'waiting' || data?.remaking?.state === 'running' || data?.items.some((grid) => isMaking(grid.making)) ? whileMakingMs : false),
  })

export const maskChangeQuery = (maskId: number) =>
  queryOptions({
    queryKey: ['feeds', 'mask-change', maskId],
    queryFn: ({ signal }) => call(endpoints.maskChange, { params: { id: maskId }, signal }),
  })

function useMaskAct<T>(feedId: number, act: (given: T) => Promise<FeedMasks>) {
  const client = useQueryClient()
  return useMutation({ mutationFn: act, onSuccess: (masks) => client.setQueryData(feedMasksQuery(feedId).queryKey, masks) })
}

export function useMakeMask(feedId: number) {
  return useMaskAct(feedId, (body: BodyInputOf<typeof endpoints.makeMask>) => call(endpoints.makeMask, { params: { id: feedId }, body }))
}

export function usePutInForce(feedId: number) {
  return useMaskAct(feedId, ({ id, insteadOf }: { id: number; insteadOf: number }) => call(endpoints.putMaskInForce, { params: { id }, body: { insteadOf } }))
}
