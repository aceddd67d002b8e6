import { useQuery } from '@tanstack/react-query'
import { lazy, Suspense } from 'react'
import { Link } from 'react-router-dom'
import type { Feed } from '../../../shared/schemas/feeds'
import type { Region } from '../../../shared/schemas/regions'
import type { Today } from '../../../shared/schemas/today'
import { useMe } from '../../api/auth'
import { layerQuery } from '../../api/layers'
import { Age } from '../../components/ui/age'
import { clockTime, longDay, zoneWord } from '../../lib/dates'
import { mapLink } from '../layer-map/map-address'

const MapOfDay = lazy(() => import('./map-of-day'))

interface Props {
  day: Today['days'][number]
  regions: readonly Region[] | undefined
  feed: Feed | undefined
}

/** The water on the chosen day; the map itself comes in its own time, the figures do not wait for it. */
export function TodayMap({ day, regions, feed }: Props) {
  return (
    <section aria-label="Map" className="grid content-start gap-3">
      <div className="flex flex-wrap items-baseline justify-between gap-x-4 pl-11 tab:pl-13">
        <h2 className="font-strong">
          {feed?.name ?? 'Map'}
          {feed && day.layerId !== null && (
            <Link className="link ml-4 text-small font-text" to={mapLink({ feedId: feed.id, day: day.day })}>
              day by day
            </Link>
          )}
        </h2>
        <LayerWords day={day} />
      </div>
      <Suspense fallback={<div className="hatch ml-13 aspect-[1.15] border border-rule2" role="status" aria-label="Map on its way" />}>
        <MapOfDay layerId={day.layerId} regions={regions} feed={feed} />
      </Suspense>
    </section>
  )
}

function LayerWords({ day }: { day: Today['days'][number] }) {
  const zone = useMe()?.timeZone ?? 'UTC'
  const layer = useQuery({ ...layerQuery(day.layerId ?? 0), enabled: day.layerId !== null }).data
  if (day.layerId === null) return <p className="text-small text-ink2">no view of {longDay(day.day)}</p>
  return (
    <p className="text-small text-ink2">
      view of {longDay(day.day)}
      {layer && (
        <>
          {layer.hasClock && `, ${clockTime(layer.observedAt, zone)} ${zoneWord(layer.observedAt, zone)}`}, <Age at={layer.endsAt ?? layer.observedAt} old />
        </>
      )}
    </p>
  )
}
