import { useQuery } from '@tanstack/react-query'
import { useMemo } from 'react'
import type { RegionGeometry } from '../../../shared/schemas/regions'
import { sentenceOf } from '../../api/api-error'
import { measureQuery } from '../../api/regions'
import { useSettled } from '../../hooks/use-settled'

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
  const answered = current && !measured.isPlaceholderData ? measured.data : undefined
  const refusal = answered?.refusal ?? null
  return {
    feeds: outline === null || refusal ? [] : (measured.data?.feeds ?? []),
    /** Only the answer to the outline as it stands may be drawn in its place. */
    outline: answered?.outline ?? undefined,
    problem: refusal?.sentence ?? (current && measured.error ? sentenceOf(measured.error) : undefined),
    place: refusal?.place ?? undefined,
    allLand: refusal?.reason === 'all-land',
  }
}

function provisional(corners: readonly [number, number][]): RegionGeometry | null {
  const [first] = corners
  return first && corners.length >= 3 ? { type: 'Polygon', coordinates: [[...corners, first]] } : null
}
