import { queryOptions } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import { call } from './call'

export const caughtMailQuery = queryOptions({
  queryKey: ['mail'],
  queryFn: ({ signal }) => call(endpoints.listCaughtMail, { signal }),
  /** The page is public and has no event stream: it looks by itself. */
  refetchInterval: 3000,
})

export function caughtLetterQuery(id: string) {
  return queryOptions({
    queryKey: ['mail', id],
    queryFn: ({ signal }) => call(endpoints.caughtLetter, { params: { id }, signal }),
  })
}
