import { infiniteQueryOptions } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import { call } from './call'

export const auditQuery = () =>
  infiniteQueryOptions({
    queryKey: ['audit'],
    queryFn: ({ pageParam, signal }) => call(endpoints.listAudit, { query: { limit: 100, cursor: pageParam }, signal }),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page) => page.nextCursor ?? undefined,
  })
