import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { AlertItem } from '../../../shared/schemas/alerts'
import { useCan, useMe } from '../../api/auth'
import { Button, ButtonLink } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { Mark, severityMark } from '../../components/ui/mark'
import { SectionHead } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { useAcknowledgeFromList } from '../../hooks/use-acknowledge-from-list'
import { useNow } from '../../hooks/use-now'
import { ageWords, hoursSince } from '../../lib/age'
import { dayAndTime } from '../../lib/dates'
import { timesUsual } from '../../lib/format'
import { RecentDays } from './recent-days'

const shownAtMost = 5

/** What people were told of and have not closed; the worst unacknowledged one carries the page's button. */
export function OpenAlerts({ alerts, error }: { alerts: readonly AlertItem[] | undefined; error: Error | null }) {
  if (error && !alerts) return <Failure error={error} />
  if (!alerts) return <Waiting lines={4} label="Waiting for alerts" />
  const worst = alerts.find((alert) => alert.state === 'open')?.id
  return (
    <section aria-label="Open alerts">
      <SectionHead count={alerts.length}>Open alerts</SectionHead>
      {alerts.length === 0 && (
        <p className="py-4 text-ink2">
          No alert is open. Past ones are under <Link className="link" to={paths.alerts.to()}>Alerts</Link>.
        </p>
      )}
      <ul>
        {alerts.slice(0, shownAtMost).map((alert) => (
          <AlertRow key={alert.id} alert={alert} filled={alert.id === worst} />
        ))}
      </ul>
      {alerts.length > shownAtMost && (
        <p className="pt-3">
          <Link className="link" to={paths.alerts.to()}>
            All {alerts.length} open alerts
          </Link>
        </p>
      )}
    </section>
  )
}

function AlertRow({ alert, filled }: { alert: AlertItem; filled: boolean }) {
  const now = useNow()
  const mayAct = useCan('alert:act')
  const { timesUsual: times } = alert.latest ?? alert.evidence
  const to = paths.alert.to({ id: alert.id })
  return (
    <li className="grid gap-2 border-b border-rule py-4">
      <div className="flex items-center gap-2.5">
        <Mark name={severityMark(alert.severity)} size={20} className="text-ember" />
        <h3 className="min-w-0 text-lead">
          <Link to={to} className="hover:text-accent">
            {alert.regionName}
          </Link>{' '}
          <span className="ml-1 text-body font-text">{alert.severity}</span>
        </h3>
        <span className="fig ml-auto text-small whitespace-nowrap text-ink2">{ageWords(hoursSince(alert.raisedAt, now))} open</span>
      </div>
      <div className="grid grid-cols-[7rem_minmax(0,1fr)] items-start gap-x-5 gap-y-2 tab:grid-cols-[7rem_minmax(0,1fr)_minmax(0,1.2fr)]">
        <div className="text-ember">
          {times !== null && (
            <>
              <span className="fig block text-statement">{timesUsual(times)}</span>
              <span className="block text-small text-ink2">times usual</span>
            </>
          )}
        </div>
        <RecentDays days={alert.recent} />
        <p className="col-span-2 text-small text-ink2 tab:col-span-1">{alert.story}</p>
      </div>
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
        <Holder alert={alert} />
        <div className="flex flex-1 items-center justify-end gap-4 max-tab:basis-full">
          <Link to={`${to}#why`} className="link inline-flex min-h-11 items-center font-strong tab:min-h-0">
            Why?
          </Link>
          {filled && mayAct ? <Acknowledge alert={alert} /> : !filled && <ButtonLink kind="text" to={to}>Open</ButtonLink>}
        </div>
      </div>
    </li>
  )
}

function Acknowledge({ alert }: { alert: AlertItem }) {
  const { act, busy, error } = useAcknowledgeFromList(alert)
  return (
    <>
      <Button kind="filled" disabled={busy} onClick={act} className="max-tab:flex-1">
        Acknowledge
      </Button>
      {error && <div className="basis-full"><Failure error={error} /></div>}
    </>
  )
}

function Holder({ alert }: { alert: AlertItem }) {
  const me = useMe()
  const zone = me?.timeZone ?? 'UTC'
  if (alert.hold) return <p className="text-small text-ink2">On hold until {dayAndTime(alert.hold.until, zone)}: {alert.hold.reason}</p>
  if (alert.assignee) return <p className="text-small text-ink2">{alert.assignee.id === me?.id ? 'You have it' : `${alert.assignee.name} has it`}</p>
  if (alert.acknowledgedBy && alert.acknowledgedAt) {
    return <p className="text-small text-ink2">Acknowledged by {alert.acknowledgedBy}, {dayAndTime(alert.acknowledgedAt, zone)}</p>
  }
  return <p className="text-small font-strong text-ember">Nobody has acknowledged it</p>
}
