import { useQuery, useQueryClient } from '@tanstack/react-query'
import { lazy, Suspense, useEffect } from 'react'
import { Link, useSearchParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Feed } from '../../../shared/schemas/feeds'
import { feedsQuery } from '../../api/feeds'
import { layerLegendQuery, layerQuery } from '../../api/layers'
import { regionsQuery } from '../../api/regions'
import { Choice } from '../../components/ui/choice'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { SelectField, TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { Page } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { clockTime } from '../../lib/dates'
import { CellLine } from './cell-line'
import { CellReadout } from './cell-readout'
import { DayHead } from './day-head'
import { DaySlider } from './day-slider'
import { layerOfDay } from './day-words'
import { addressParams, readAddress, type MapAddress } from './map-address'
import { within } from './slider-days'
import { useDays } from './use-days'

const LayerSea = lazy(() => import('./layer-sea'))

/** A feed's layers on the map, day by day. */
export function Component() {
  const feeds = useQuery(feedsQuery())
  const [search] = useSearchParams()
  const address = readAddress(search)
  if (feeds.error && !feeds.data) {
    return (
      <Page title="Layers on the map">
        <Failure error={feeds.error} onRetry={() => void feeds.refetch()} />
      </Page>
    )
  }
  const withLayers = feeds.data?.items.filter((feed) => feed.newestLayerAt !== null)
  const feed = withLayers?.find((one) => one.id === address.feedId) ?? withLayers?.find((one) => !one.retired) ?? withLayers?.[0]
  return (
    <Page title="Layers on the map">
      {!withLayers && <Waiting lines={6} />}
      {withLayers && !feed && <Empty title="There is no layer yet.">Layers appear here as soon as a file has been read. Files are sent in the room of layers.</Empty>}
      {withLayers && feed && <FeedOnMap feeds={withLayers} feed={feed} address={address} />}
    </Page>
  )
}

function FeedOnMap({ feeds, feed, address }: { feeds: readonly Feed[]; feed: Feed; address: MapAddress }) {
  const [, setSearch] = useSearchParams()
  const client = useQueryClient()
  const regions = useQuery(regionsQuery()).data?.items.filter((region) => !region.retired) ?? []
  const first = feed.oldestLayerAt?.slice(0, 10) ?? ''
  const last = feed.newestLayerAt?.slice(0, 10) ?? ''
  const day = within(address.day ?? last, first, last)
  const { days, error, retry } = useDays(feed.id, day)
  const layers = days?.layersOf.get(day)
  const shown = layerOfDay(layers, address.layerId)
  const layer = useQuery({ ...layerQuery(shown?.id ?? 0), enabled: shown !== undefined }).data
  const go = (change: MapAddress) => setSearch(addressParams({ feedId: feed.id, day, at: address.at, ...change }), { replace: true, preventScrollReset: true })

  const next = [days?.before, days?.after].flatMap((one) => (one === undefined ? [] : (layerOfDay(days?.layersOf.get(one), undefined)?.id ?? [])))
  const nextKey = next.join(' ')
  useEffect(() => {
    for (const id of nextKey.split(' ').filter(Boolean).map(Number)) {
      void client.prefetchQuery(layerLegendQuery(id))
      void client.prefetchQuery(layerQuery(id))
    }
  }, [client, nextKey])

  return (
    <>
      <div className="flex flex-wrap items-end justify-between gap-x-9 gap-y-3">
        <div>
          <div className="mb-1 text-small text-ink2">
            <Link className="link inline-flex min-h-11 items-center tab:min-h-0" to={paths.layers.to()}>
              Layers
            </Link>
          </div>
          <h1 className="text-title">Day by day on the map</h1>
        </div>
        <div className="grid w-full grid-cols-[minmax(0,1fr)_9.5rem] gap-4 tab:w-auto tab:grid-cols-[22rem_10rem]">
          <SelectField label="Feed" value={feed.id} onChange={(event) => go({ feedId: Number(event.target.value) })}>
            {feeds.map((one) => (
              <option key={one.id} value={one.id}>
                {one.name}
                {one.retired ? ' (retired)' : ''}
              </option>
            ))}
          </SelectField>
          <TextField className="fig" type="date" label="Day" value={day} min={first} max={last} onChange={(event) => event.target.value && go({ day: event.target.value })} />
        </div>
      </div>
      {error && <Failure error={error} onRetry={retry} />}
      {days && (
        <section
          aria-label="Days"
          className="fixed inset-x-0 bottom-[calc(3.75rem+env(safe-area-inset-bottom))] z-[900] grid gap-2 border-t border-ink bg-paper px-4 pt-2 pb-1 tab:static tab:border-0 tab:p-0"
        >
          <CellLine layer={shown ? layer : undefined} at={address.at} />
          <DayHead day={day} days={days} onChange={(to) => go({ day: to })} />
          <DaySlider day={day} first={days.first ?? day} last={days.last ?? day} layersOf={days.layersOf} onChange={(to) => go({ day: to })} />
        </section>
      )}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-6 desk:grid-cols-[minmax(0,1.75fr)_minmax(0,1fr)]">
        <section aria-label="Map" className="grid grid-cols-[minmax(0,1fr)] content-start gap-3">
          <Suspense fallback={<div className="hatch aspect-[1.3] border border-rule2" role="status" aria-label="Map on its way" />}>
            <LayerSea
              day={day}
              feed={feed}
              layerId={shown?.id ?? null}
              layer={layer}
              regions={regions}
              next={next}
              at={address.at}
              onPick={(at) => go({ at, layerId: address.layerId })}
            />
          </Suspense>
        </section>
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-6">
          {shown?.suspect && layer?.suspect && (
            <Message title={`Marked suspect by ${layer.suspect.by}.`}>{layer.suspect.note} Its days are judged without it.</Message>
          )}
          {layers && layers.length > 1 && (
            <Choice
              label="Layer of the day"
              value={String(shown?.id)}
              onChange={(id) => go({ layerId: Number(id) })}
              options={layers.map((one) => ({ value: String(one.id), label: one.hasClock ? clockTime(one.observedAt, 'UTC') : `layer ${one.id}` }))}
            />
          )}
          <CellReadout layer={shown ? layer : undefined} at={address.at} onForget={() => go({ at: undefined, layerId: address.layerId })} />
        </div>
      </div>
      <div aria-hidden className="h-20 tab:hidden" />
    </>
  )
}
