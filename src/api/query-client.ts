import { QueryClient } from '@tanstack/react-query'
import { ApiError } from './api-error'

/** What the server refused stays refused; only a lost connection or a server fault is worth another try. */
function worthAnotherTry(count: number, error: Error): boolean {
  if (!(error instanceof ApiError)) return false
  return count < 2 && (error.status === 0 || error.status >= 500) && error.code !== 'unreadable-reply'
}

export function makeQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: { queries: { staleTime: 20_000, retry: worthAnotherTry }, mutations: { retry: false, networkMode: 'always' } },
  })
}
