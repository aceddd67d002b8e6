import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import type { BodyInputOf } from '../../shared/schemas/endpoint'
import { call } from './call'

export const usersQuery = () =>
  queryOptions({
    queryKey: ['users'],
    queryFn: ({ signal }) => call(endpoints.listUsers, { query: { limit: 500 }, signal }),
  })

export const invitationsQuery = () =>
  queryOptions({
    queryKey: ['users', 'invitations'],
    queryFn: ({ signal }) => call(endpoints.listInvitations, { query: { limit: 500 }, signal }),
  })

function useUsersChanged() {
  const client = useQueryClient()
  return () => client.invalidateQueries({ queryKey: ['users'] })
}

export function useCreateUser() {
  const onSuccess = useUsersChanged()
  return useMutation({
    mutationFn: (body: BodyInputOf<typeof endpoints.createUser>) => call(endpoints.createUser, { body }),
    onSuccess,
  })
}

export function useChangeUser(id: number) {
  const onSuccess = useUsersChanged()
  return useMutation({
    mutationFn: (body: BodyInputOf<typeof endpoints.changeUser>) => call(endpoints.changeUser, { params: { id }, body }),
    onSuccess,
  })
}

export function useInvite() {
  const onSuccess = useUsersChanged()
  return useMutation({
    mutationFn: (body: BodyInputOf<typeof endpoints.invite>) => call(endpoints.invite, { body }),
    onSuccess,
  })
}
