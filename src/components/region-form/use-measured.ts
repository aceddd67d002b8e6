import { useQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import type { RegionGeometry } from '../../../shared/schemas/regions'
import { ApiError } from '../../api/api-error'
import { fieldErrors } from '../../api/field-errors'
import { measureQuery } from '../../api/regions'
import { useSettled } from '../../hooks/use-settled'
import type { Position } from '../outline/parse-position'

const waitMs = 350

interface Given {
  geometry: RegionGeometry | null
  /** Corners of an outline that is still being drawn, longitude first. */
  corners: readonly [number, number][]
  drawing: boolean
  shoreBufferKm: number
  inland: boolean
}

/** What the server makes of the outline as it stands: areas, whole cells and repairs, or why it cannot be taken and where. */
export function useMeasured({ geometry, corners, drawing, shoreBufferKm, inland }: Given) {
  const outline = useMemo(() => (drawing ? provisional(corners) : geometry), [drawing, corners, geometry])
  const asked = useSettled(
    useMemo(() => ({ outline, shoreBufferKm, inland }), [outline, shoreBufferKm, inland]),
    waitMs,
  )
  const measured = useQuery({ ...measureQuery(asked.outline, asked.shoreBufferKm, asked.inland), enabled: asked.outline !== null })
  const current = outline !== null && asked.outline === outline
  const error = current && measured.error instanceof ApiError ? measured.error : null
  return {
    data: outline === null || error ? undefined : measured.data,
    /** Only the answer to the outline as it stands may be drawn in its place. */
    exact: current && !measured.isPlaceholderData && !error ? measured.data : undefined,
    problem: fieldErrors(error)['geometry'] ?? (error ? error.message : undefined),
    place: placeOf(error),
    allLand: error?.details['reason'] === 'all-land',
  }
}

function provisional(corners: readonly [number, number][]): RegionGeometry | null {
  const [first] = corners
  return first && corners.length >= 3 ? { type: 'Polygon', coordinates: [[...corners, first]] } : null
}

function placeOf(error: ApiError | null): Position | undefined {
  const place = error?.details['place']
  if (typeof place !== 'object' || place === null || !('longitude' in place) || !('latitude' in place)) return undefined
  const { longitude, latitude } = place
  return typeof longitude === 'number' && typeof latitude === 'number' ? { longitude, latitude } : undefined
}
