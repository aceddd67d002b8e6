import { infiniteQueryOptions, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import type { FileStatus } from '../../shared/schemas/files'
import { call } from './call'

export const filesQuery = (status?: FileStatus) =>
  infiniteQueryOptions({
    queryKey: ['files', 'list', status ?? null],
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listFiles, { query: { limit: 50, cursor: pageParam, status }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  })

export const fileQuery = (id: number) =>
  queryOptions({
    queryKey: ['files', 'one', id],
    queryFn: ({ signal }) => call(endpoints.file, { params: { id }, signal }),
  })

export function useDeleteFile(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () => call(endpoints.deleteFile, { params: { id } }),
    onSuccess: async () => {
      client.removeQueries({ queryKey: ['files', 'one', id] })
      await client.invalidateQueries({ queryKey: ['files', 'list'] })
      await client.invalidateQueries({ queryKey: ['layers'] })
    },
  })
}
