import { infiniteQueryOptions, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import type { z } from 'zod'
import type * as alerts from '../../shared/schemas/alerts'
import { endpoints } from '../../shared/schemas/endpoints'
import { isConflict } from './api-error'
import { call } from './call'

export type AlertFilter = Pick<z.input<typeof alerts.alertsQuery>, 'state' | 'severity'> & { regionId?: number }

export function alertsQuery(filter: AlertFilter = {}) {
  return queryOptions({
    queryKey: ['alerts', 'list', filter],
    queryFn: ({ signal }) => call(endpoints.listAlerts, { query: { ...filter, limit: 100 }, signal }),
  })
}

/** The same list in pages, for the room of alerts. */
export function alertPagesQuery(filter: AlertFilter) {
  return infiniteQueryOptions({
    queryKey: ['alerts', 'pages', filter],
    queryFn: ({ signal, pageParam }) =>
      call(endpoints.listAlerts, { query: { ...filter, limit: 50, cursor: pageParam ?? undefined }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  })
}

export function alertQuery(id: number) {
  return queryOptions({
    queryKey: ['alerts', id],
    queryFn: ({ signal }) => call(endpoints.alert, { params: { id }, signal }),
  })
}

export function explanationQuery(id: number) {
  return queryOptions({
    queryKey: ['alerts', id, 'explanation'],
    queryFn: ({ signal }) => call(endpoints.alertExplanation, { params: { id }, signal }),
    staleTime: 10 * 60_000,
  })
}

/**
 * One act on an alert. The version the person saw goes with it; when somebody else was faster the server refuses (409),
 * nothing is overwritten and the new state is fetched.
 */
function useAlertAct<Body>(id: number, act: (body: Body) => Promise<alerts.Alert>) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: act,
    onSuccess: (alert) => {
      client.setQueryData(alertQuery(id).queryKey, alert)
      void client.invalidateQueries({ queryKey: ['alerts', 'list'] })
      void client.invalidateQueries({ queryKey: ['alerts', 'pages'] })
      void client.invalidateQueries({ queryKey: ['today'] })
      void client.invalidateQueries({ queryKey: ['regions'] })
    },
    onError: (error) => {
      if (isConflict(error)) void client.invalidateQueries({ queryKey: ['alerts'] })
    },
  })
}

const at = (id: number) => ({ params: { id } })

export const useAcknowledge = (id: number) =>
  useAlertAct(id, (body: z.input<typeof alerts.acknowledgement>) => call(endpoints.acknowledgeAlert, { ...at(id), body }))
export const useAddNote = (id: number) =>
  useAlertAct(id, (body: z.input<typeof alerts.alertNote>) => call(endpoints.noteAlert, { ...at(id), body }))
export const useAssign = (id: number) =>
  useAlertAct(id, (body: z.input<typeof alerts.assignment>) => call(endpoints.assignAlert, { ...at(id), body }))
export const useHold = (id: number) =>
  useAlertAct(id, (body: z.input<typeof alerts.hold>) => call(endpoints.holdAlert, { ...at(id), body }))
export const useClose = (id: number) =>
  useAlertAct(id, (body: z.input<typeof alerts.closing>) => call(endpoints.closeAlert, { ...at(id), body }))
export const useReopen = (id: number) =>
  useAlertAct(id, (body: z.input<typeof alerts.reopening>) => call(endpoints.reopenAlert, { ...at(id), body }))
