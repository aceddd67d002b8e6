import { infiniteQueryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Job } from '../../shared/schemas/running'
import { call } from './call'

export const jobsQuery = (state?: Job['state']) =>
  infiniteQueryOptions({
    queryKey: ['jobs', state ?? null],
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listJobs, { query: { limit: 50, cursor: pageParam, state }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  })

const acts = { retry: endpoints.retryJob, pause: endpoints.pauseJob, cancel: endpoints.cancelJob } as const
export type JobAct = keyof typeof acts

export function useActOnJob(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (act: JobAct) => call(acts[act], { params: { id } }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['jobs'] }),
  })
}
