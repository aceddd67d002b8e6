import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query'
import { endpoints } from '../../shared/schemas/endpoints'
import type { BodyInputOf } from '../../shared/schemas/endpoint'
import type { HistoryAct } from '../../shared/schemas/regions'
import { addressOf, call } from './call'

export const regionsQuery = () =>
  queryOptions({
    queryKey: ['regions'],
    queryFn: ({ signal }) => call(endpoints.listRegions, { query: { limit: 500 }, signal }),
  })

export const regionQuery = (id: number) =>
  queryOptions({
    queryKey: ['regions', id],
    queryFn: ({ signal }) => call(endpoints.region, { params: { id }, signal }),
  })

/** What an outline would hold; asked again whenever it changes, the last answer staying until the next is there. */
export const measureQuery = (geometry: unknown, shoreBufferKm: number, inland: boolean) =>
  queryOptions({
    queryKey: ['measured outline', JSON.stringify(geometry), shoreBufferKm, inland],
    queryFn: ({ signal }) => call(endpoints.measureOutline, { body: { geometry, shoreBufferKm, inland }, signal }),
    placeholderData: keepPreviousData,
    staleTime: 60_000,
    retry: false,
  })

export const regionVersionsQuery = (id: number) =>
  queryOptions({
    queryKey: ['regions', id, 'versions'],
    queryFn: ({ signal }) => call(endpoints.regionVersions, { params: { id }, signal }),
  })

/** Cells of the newest view, of a region that holds too few for percentiles. */
export const singleCellsQuery = (regionId: number, feedId: number) =>
  queryOptions({
    queryKey: ['regions', regionId, 'cells', feedId],
    queryFn: ({ signal }) => call(endpoints.regionCells, { params: { id: regionId }, query: { feedId }, signal }),
  })

/** Reads the areas of a file; nothing is saved by it. */
export function useReadAreas() {
  return useMutation({
    mutationFn: ({ file, inland }: { file: File; inland: boolean }) => {
      const form = new FormData()
      form.append('file', file, file.name)
      return call(endpoints.importRegions, { query: { inland: inland ? 'true' : 'false' }, form })
    },
  })
}

export const outlineHref = (id: number, version: number) => addressOf(endpoints.exportOutline, { params: { id }, query: { version } })
export const outlineKmlHref = (id: number, version: number) => addressOf(endpoints.exportOutlineKml, { params: { id }, query: { version } })

export type NewRegionBody = BodyInputOf<typeof endpoints.createRegion>
export type RegionChangeBody = BodyInputOf<typeof endpoints.changeRegion>

export function useCreateRegion() {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: NewRegionBody) => call(endpoints.createRegion, { body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['regions'] }),
  })
}

export function useChangeRegion(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (body: RegionChangeBody) => call(endpoints.changeRegion, { params: { id }, body }),
    onSuccess: () => client.invalidateQueries({ queryKey: ['regions'] }),
  })
}

export function useRetireRegion(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: () => call(endpoints.retireRegion, { params: { id } }),
    onSuccess: async () => {
      client.removeQueries({ queryKey: ['regions', id] })
      await client.invalidateQueries({ queryKey: ['regions'], exact: true })
    },
  })
}

/** Pauses or stops the reading of a region's history, or goes on with it. */
export function useSteerHistory(id: number) {
  const client = useQueryClient()
  return useMutation({
    mutationFn: (act: HistoryAct) => call(endpoints.steerHistory, { params: { id }, body: { act } }),
    onSettled: () => client.invalidateQueries({ queryKey: ['regions'] }),
  })
}
