import type { AlertItem } from '../../../shared/schemas/alerts'
import { useMe } from '../../api/auth'
import { useNow } from '../../hooks/use-now'
import { ageWords, hoursSince } from '../../lib/age'
import { dayAndTime, zoneWord } from '../../lib/dates'

/** Open, acknowledged or closed, by whom and since when; announced when it changes. */
export function AlertStanding({ alert }: { alert: AlertItem }) {
  const me = useMe()
  const now = useNow()
  const zone = me?.timeZone ?? 'UTC'
  const at = (instant: string) => `${dayAndTime(instant, zone)} ${zoneWord(instant, zone)}`
  const who = (name: string | null) => (name === null ? 'somebody' : name === me?.name ? 'you' : name)
  return (
    <p role="status" className="text-body text-ink2">
      {alert.state === 'open' && <span className="font-strong text-ember">Not acknowledged for {ageWords(hoursSince(alert.raisedAt, now))}.</span>}
      {alert.state === 'acknowledged' && (
        <>
          <b className="font-strong text-ink">Acknowledged</b>
          {alert.acknowledgedAt && ` ${at(alert.acknowledgedAt)}`} by {who(alert.acknowledgedBy)}.
        </>
      )}
      {alert.state === 'closed' && (
        <>
          <b className="font-strong text-ink">Closed</b>
          {alert.closedAt && ` ${at(alert.closedAt)}`}
          {alert.outcome && `: ${alert.outcome}${alert.cause ? ` (${alert.cause})` : ''}`}.
        </>
      )}
      {alert.state !== 'closed' && alert.assignee && ` ${alert.assignee.id === me?.id ? 'You have it.' : `${alert.assignee.name} has it.`}`}
      {alert.state !== 'closed' && alert.hold && ` On hold until ${at(alert.hold.until)}: ${alert.hold.reason}`}
    </p>
  )
}
