import { useEffect, useState } from 'react'
import { useMap, useMapEvents } from 'react-leaflet'
import { useTheme } from '../../hooks/use-theme'
import { tilesOfView } from './tile-address'

/** What is on the screen comes first; neighbours are fetched once the map has been still for this long. */
const stillMs = 400

/** Fetches the tiles of layers that may be looked at next, for the view the map has now, into the browser's cache. */
export function PrefetchTiles({ layerIds }: { layerIds: readonly number[] }) {
  const map = useMap()
  const theme = useTheme()
  const [moves, setMoves] = useState(0)
  useMapEvents({ moveend: () => setMoves((count) => count + 1) })
  const wanted = layerIds.join(' ')
  useEffect(() => {
    const stopped = new AbortController()
    const timer = setTimeout(() => {
      const bounds = map.getBounds()
      const view = { west: bounds.getWest(), south: bounds.getSouth(), east: bounds.getEast(), north: bounds.getNorth(), zoom: map.getZoom() }
      const addresses = wanted.split(' ').filter(Boolean).flatMap((id) => tilesOfView(Number(id), theme, view))
      for (const address of addresses) void fetch(address, { priority: 'low', signal: stopped.signal }).catch(() => undefined)
    }, stillMs)
    return () => {
      clearTimeout(timer)
      stopped.abort()
    }
  }, [map, theme, wanted, moves])
  return null
}
