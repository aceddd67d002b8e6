import { infiniteQueryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { Letter } from '../../shared/schemas/duty'
import { endpoints } from '../../shared/schemas/endpoints'
import { call } from './call'

export const lettersQuery = (state?: Letter['state']) =>
  infiniteQueryOptions({
    queryKey: ['letters', state ?? null],
    queryFn: ({ pageParam, signal }) =>
      call(endpoints.listLetters, { query: { limit: 50, cursor: pageParam, state }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  })

export function useRetryLetter(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () => call(endpoints.retryLetter, { params: { id } }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['letters'] }),
  })
}
