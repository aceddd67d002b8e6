import { Circle } from 'react-leaflet'
import type { Region } from '../../../shared/schemas/regions'
import { ringPane } from './panes'
import { useMapView } from './use-map-view'

const ringsKm = [10, 20, 40]
const kmPerDegree = 111.195

/** Distance rings round the site, and the site itself with its name. */
export function RangeRings({ site }: { site: NonNullable<Region['site']> }) {
  const view = useMapView()
  const x = view.x(site.longitude)
  const y = view.y(site.latitude)
  const labels = ringsKm.map((km) => ({ km, y: view.y(site.latitude + km / kmPerDegree), below: view.y(site.latitude - km / kmPerDegree) }))
  return (
    <>
      {ringsKm.map((km) => (
        <RingAt key={km} centre={[site.latitude, site.longitude]} km={km} />
      ))}
      <div aria-hidden className="pointer-events-none absolute inset-0 z-[620] overflow-hidden">
        {labels.map((label) => {
          const top = label.y > 14 ? label.y : label.below
          if (top < 14 || top > view.height - 14) return null
          return (
            <span key={label.km} className="fig absolute -translate-1/2 bg-paper px-1 text-small text-ink" style={{ left: x, top }}>
              {label.km} km
            </span>
          )
        })}
        <svg className="absolute overflow-visible" style={{ left: x, top: y }} width="1" height="1">
          <path d="M0 -9L9 0L0 9L-9 0Z" fill="var(--paper)" stroke="var(--ink)" strokeWidth="1.6" />
          <circle r="2.6" fill="var(--ink)" />
        </svg>
        <span
          className="absolute -translate-y-1/2 bg-paper px-1.5 text-small font-strong whitespace-nowrap text-ink"
          style={x > view.width * 0.7 ? { right: view.width - x + 14, top: y } : { left: x + 14, top: y }}
        >
          {site.name || 'site'}
        </span>
      </div>
    </>
  )
}

function RingAt({ centre, km }: { centre: [number, number]; km: number }) {
  const shared = { center: centre, radius: km * 1000, pane: ringPane, interactive: false, fill: false }
  return (
    <>
      <Circle {...shared} className="map-ring-halo" />
      <Circle {...shared} className="map-ring" />
    </>
  )
}
