import { grouped } from '../../lib/format'
import { useMapView } from './use-map-view'

const kmPerDegree = 111.32
const nice = [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000, 2000, 5000]

/** Two segments in whole kilometres, measured at the middle of the map. */
export function ScaleBar() {
  const view = useMapView()
  const middle = ((view.south + view.north) / 2) * (Math.PI / 180)
  const kmPerPx = ((view.east - view.west) * kmPerDegree * Math.cos(middle)) / Math.max(1, view.width)
  const km = nice.findLast((length) => length / kmPerPx <= Math.min(110, view.width / 5)) ?? 1
  const px = km / kmPerPx
  // Before the map has a size there is nothing to measure.
  if (!Number.isFinite(px)) return null
  return (
    <div className="pointer-events-none absolute right-3 bottom-3 z-[650] bg-paper px-2.5 pt-0.5 pb-2" data-scale-bar>
      <div className="fig flex min-w-max justify-between gap-2 text-small text-ink" style={{ width: px }}>
        <span>0</span>
        <span className="whitespace-nowrap">{grouped(km)} km</span>
      </div>
      <div className="flex h-1.5 border border-(--segment) bg-paper" style={{ width: px }}>
        <div className="w-1/2 bg-(--segment)" />
      </div>
    </div>
  )
}
