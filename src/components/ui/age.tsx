import { useMe } from '../../api/auth'
import { useNow } from '../../hooks/use-now'
import { ageWords, hoursSince } from '../../lib/age'
import { dayAndTime, zoneWord } from '../../lib/dates'

/** How old an instant is by the server's clock, with the exact time on hover; `old` adds the word. */
export function Age({ at, old = false }: { at: string; old?: boolean }) {
  const now = useNow()
  const zone = useMe()?.timeZone ?? 'UTC'
  return (
    <time dateTime={at} title={`${dayAndTime(at, zone)} ${zoneWord(at, zone)}`} className="whitespace-nowrap tabular-nums">
      {ageWords(hoursSince(at, now))}
      {old && ' old'}
    </time>
  )
}
