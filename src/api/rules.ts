import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import { endpoints } from '../../shared/schemas/endpoints'
import type { BodyInputOf } from '../../shared/schemas/endpoint'
import type { ruleDefinition } from '../../shared/schemas/rules'
import { call } from './call'

export type RuleDefinition = z.infer<typeof ruleDefinition>

export const rulesQuery = (regionId: number) =>
  queryOptions({
    queryKey: ['regions', regionId, 'rules'],
    queryFn: ({ signal }) => call(endpoints.regionRules, { params: { id: regionId }, signal }),
  })

export function useChangeRule(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: BodyInputOf<typeof endpoints.changeRule>) => call(endpoints.changeRule, { params: { id }, body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['regions'] }),
  })
}

export function useActivateRule(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: BodyInputOf<typeof endpoints.activateRule>) =>
      call(endpoints.activateRule, { params: { id }, body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['regions'] }),
  })
}
