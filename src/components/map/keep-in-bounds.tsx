import { useEffect } from 'react'
import { useMap } from 'react-leaflet'
import type { MapBounds } from './sea-map'

/** Shows the bounds again when they or the width of the page change, and lets the wheel zoom only where it was asked to. */
export function KeepInBounds({ bounds }: { bounds: MapBounds }) {
  const map = useMap()
  const [[south, west], [north, east]] = bounds
  useEffect(() => {
    const show = () => map.fitBounds([[south, west], [north, east]], { animate: false })
    show()
    const observer = new ResizeObserver(() => {
      map.invalidateSize({ pan: false })
      show()
    })
    observer.observe(map.getContainer())
    const wheelOn = () => map.scrollWheelZoom.enable()
    const wheelOff = () => map.scrollWheelZoom.disable()
    map.on('focus', wheelOn).on('blur', wheelOff)
    return () => {
      observer.disconnect()
      map.off('focus', wheelOn).off('blur', wheelOff)
    }
  }, [map, south, west, north, east])
  return null
}
