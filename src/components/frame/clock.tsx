import { useNow } from '../../hooks/use-now'
import { clockTime, weekdayAndDay, zoneWord } from '../../lib/dates'

/** The server's time where the person is, and in UTC. */
export function Clock({ timeZone }: { timeZone: string }) {
  const now = useNow()
  const zone = zoneWord(now, timeZone)
  return (
    <time dateTime={new Date(now).toISOString()} className="fig text-small whitespace-nowrap">
      <b className="font-heading">
        {weekdayAndDay(now, timeZone)} {clockTime(now, timeZone)}
      </b>{' '}
      <span className="text-ink2">
        {zone}
        {zone !== 'UTC' && <span className="hidden tab:inline">, {clockTime(now, 'UTC')} UTC</span>}
      </span>
    </time>
  )
}
