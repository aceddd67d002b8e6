import { useInfiniteQuery, useQuery } from '@tanstack/react-query'
import type { ReactNode } from 'react'
import { alertPagesQuery, alertsQuery } from '../../api/alerts'
import { regionsQuery } from '../../api/regions'
import { addressOf } from '../../api/call'
import { endpoints } from '../../../shared/schemas/endpoints'
import { Button } from '../../components/ui/button'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { Page, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { AlertTable } from './alert-table'
import { Filters } from './filters'
import { countAtHead } from '../../lib/format'
import { useFilters } from './use-filters'

/** What people were told of: what stands open, who has it, and how the past ones ended. */
export function Component() {
  const [filter, change] = useFilters()
  const pages = useInfiniteQuery(alertPagesQuery(filter))
  const open = useQuery(alertsQuery({ state: 'open' })).data?.items.length
  const held = useQuery(alertsQuery({ state: 'acknowledged' })).data?.items.length
  const regions = useQuery(regionsQuery()).data?.items
  const alerts = pages.data?.pages.flatMap((page) => page.items)
  return (
    <Page title="Alerts">
      <Statement worry={open ? worryWords(open) : undefined}>{restWords(open, held)}</Statement>
      <Filters filter={filter} regions={regions} onChange={change} csv={addressOf(endpoints.exportAlerts, { query: filter })} />
      {pages.error && !alerts && <Failure error={pages.error} onRetry={() => void pages.refetch()} />}
      {!alerts && !pages.error && <Waiting lines={5} label="Waiting for alerts" />}
      {alerts?.length === 0 && <NoAlerts filtered={Object.values(filter).some((value) => value !== undefined)} onAll={() => change({})} />}
      {alerts && alerts.length > 0 && <AlertTable alerts={alerts} />}
      {pages.hasNextPage && (
        <div>
          <Button disabled={pages.isFetchingNextPage} onClick={() => void pages.fetchNextPage()}>
            Older alerts
          </Button>
        </div>
      )}
    </Page>
  )
}

function worryWords(open: number): string {
  return open === 1 ? 'One alert waits for somebody.' : `${countAtHead(open)} alerts wait for somebody.`
}

function restWords(open: number | undefined, held: number | undefined): ReactNode {
  if (open === undefined || held === undefined) return 'Alerts'
  if (held === 0) return open === 0 ? 'No alert is open.' : 'Nobody has acknowledged it yet.'
  return held === 1 ? `One ${open === 0 ? 'alert ' : ''}is acknowledged and not closed.` : `${countAtHead(held)} ${open === 0 ? 'alerts ' : ''}are acknowledged and not closed.`
}

function NoAlerts({ filtered, onAll }: { filtered: boolean; onAll: () => void }) {
  if (!filtered) return <Empty title="No alert yet.">When a region meets its rule, the alert appears here and letters go to those who subscribed.</Empty>
  return (
    <Empty title="No alert fits." action={<Button onClick={onAll}>Show all</Button>}>
      Another state, severity or region may hold some.
    </Empty>
  )
}
