import { queryOptions } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import { call } from './call'

export const todayQuery = queryOptions({
  queryKey: ['today'],
  queryFn: ({ signal }) => call(endpoints.today, { signal }),
  /** Ages grow by themselves. */
  refetchInterval: 5 * 60_000,
})
