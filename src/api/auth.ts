import { queryOptions, useMutation, useQuery, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import { can, type Action } from '../../shared/permissions'
import type * as auth from '../../shared/schemas/auth'
import { endpoints } from '../../shared/schemas/endpoints'
import { call } from './call'
import { rememberExpiry } from './session'

export const meQuery = queryOptions({
  queryKey: ['me'],
  queryFn: ({ signal }) => call(endpoints.me, { signal }),
  staleTime: 5 * 60_000,
})

/** Who is signed in; undefined on public pages. */
export function useMe() {
  return useQuery({ ...meQuery, enabled: false }).data
}

export function useCan(action: Action): boolean {
  return can(useMe(), action)
}

function useSessionStart<T>(start: (given: T) => Promise<z.infer<typeof auth.session>>) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: start,
    onSuccess: ({ user, expiresAt }) => {
      client.clear()
      rememberExpiry(expiresAt)
      client.setQueryData(meQuery.queryKey, user)
    },
  })
}

export function useSignIn() {
  return useSessionStart((body: z.input<typeof auth.credentials>) => call(endpoints.signIn, { body }))
}

export function useAcceptInvitation() {
  return useSessionStart((body: z.input<typeof auth.acceptInvitation>) => call(endpoints.acceptInvitation, { body }))
}

export function useSignOut() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () => call(endpoints.signOut),
    onSuccess: () => {
      rememberExpiry(undefined)
      client.clear()
    },
  })
}

export function useForgotPassword() {
  return useMutation({ mutationFn: (body: z.input<typeof auth.forgotPassword>) => call(endpoints.forgotPassword, { body }) })
}

export function useResetPassword() {
  return useMutation({ mutationFn: (body: z.input<typeof auth.resetPassword>) => call(endpoints.resetPassword, { body }) })
}
