import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { alertsQuery } from '../../api/alerts'
import { feedsQuery } from '../../api/feeds'
import { regionsQuery } from '../../api/regions'
import { todayQuery } from '../../api/today'
import { Failure } from '../../components/ui/failure'
import { Page, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { useDesk, useWide } from '../../hooks/use-wide'
import { DayRule } from './day-rule'
import { FeedTable } from './feed-table'
import { OpenAlerts } from './open-alerts'
import { RegionChart } from './region-chart'
import { TodayMap } from './today-map'

/** Is anything wrong over my water, and how fresh is what I know? */
export function Component() {
  const desk = useDesk()
  const wide = useWide()
  const today = useQuery(todayQuery)
  const regions = useQuery(regionsQuery())
  const feeds = useQuery(feedsQuery())
  const open = useQuery(alertsQuery({ state: 'open' }))
  const held = useQuery(alertsQuery({ state: 'acknowledged' }))
  const [chosen, setChosen] = useState<string>()

  if (today.error && !today.data) {
    return (
      <Page title="Today">
        <Failure error={today.error} onRetry={() => void today.refetch()} />
      </Page>
    )
  }
  if (!today.data) {
    return (
      <Page title="Today">
        <Waiting lines={6} />
      </Page>
    )
  }
  const { statement, days, coverageFloor, feedId } = today.data
  const day = days.find((d) => d.day === chosen) ?? days.findLast((d) => d.layerId !== null) ?? days.at(-1)
  const feed = feeds.data?.items.find((f) => f.id === feedId)
  const list = regions.data?.items
  const alerts = open.data && held.data ? [...open.data.items, ...held.data.items] : undefined

  const watched = new Set(list?.flatMap((region) => region.standing.feedId ?? []))
  const feedTable = <FeedTable feeds={feeds.data?.items} watched={watched} />
  const rule = day && <DayRule days={days} day={day} floor={coverageFloor} onChange={setChosen} />
  const map = day && <TodayMap day={day} regions={list} feed={feed} />
  const lists = (
    <div className="grid content-start gap-10">
      <OpenAlerts alerts={alerts} error={open.error ?? held.error} />
      <RegionChart regions={list} error={regions.error} day={day?.day} />
    </div>
  )
  return (
    <Page title="Today">
      <div className="grid gap-x-9 gap-y-6 desk:grid-cols-[minmax(0,1.65fr)_minmax(0,1fr)]">
        <Statement worry={statement.worry} detail={statement.detail}>
          {statement.rest}
        </Statement>
        {desk && feedTable}
      </div>
      {desk ? (
        <>
          <div className="border-t border-rule pt-2">{rule}</div>
          <div className="grid grid-cols-[minmax(0,1.52fr)_minmax(0,1fr)] gap-9">
            {map}
            {lists}
          </div>
        </>
      ) : (
        <>
          {!wide && lists}
          {rule}
          {map}
          {wide && lists}
          {feedTable}
        </>
      )}
    </Page>
  )
}
