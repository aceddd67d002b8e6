import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import type { BodyInputOf } from '../../shared/schemas/endpoint'
import { call } from './call'

/** Own subscriptions; an admin's list holds everybody's. */
export const subscriptionsQuery = () =>
  queryOptions({
    queryKey: ['subscriptions'],
    queryFn: ({ signal }) => call(endpoints.listSubscriptions, { query: { limit: 500 }, signal }),
  })

export type SubscriptionChangeBody = BodyInputOf<typeof endpoints.changeSubscription>

export function useCreateSubscription() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: BodyInputOf<typeof endpoints.createSubscription>) => call(endpoints.createSubscription, { body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['subscriptions'] }),
  })
}

export function useChangeSubscription(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: SubscriptionChangeBody) => call(endpoints.changeSubscription, { params: { id }, body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['subscriptions'] }),
  })
}

export function useDeleteSubscription(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () => call(endpoints.deleteSubscription, { params: { id } }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['subscriptions'] }),
  })
}
