import { useEffect, useEffectEvent } from 'react'
import { useMap } from 'react-leaflet'
import type { RegionGeometry } from '../../../shared/schemas/regions'
import { type Pen, showOutline, startDrawing } from './pen'

interface Props extends Pen {
  geometry: RegionGeometry | null
  drawing: boolean
  /** Whether the outline that is there can be moved by its corners. */
  editable: boolean
  onChange: (geometry: RegionGeometry) => void
}

/** Draws a new outline, or shows the one there is with corners to move. */
export function OutlinePen({ geometry, drawing, editable, onChange, onDrawn, onCorners }: Props) {
  const map = useMap()
  const drawn = useEffectEvent(onDrawn)
  const corners = useEffectEvent(onCorners)
  const changed = useEffectEvent(onChange)

  useEffect(() => {
    if (!drawing) return
    return startDrawing(map, { onDrawn: (made) => drawn(made), onCorners: (made) => corners(made) })
  }, [map, drawing])

  useEffect(() => {
    if (drawing || !geometry) return
    return showOutline(map, geometry, editable ? (made) => changed(made) : undefined)
  }, [map, drawing, editable, geometry])

  return null
}
