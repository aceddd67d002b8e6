import type { Alert, AlertEntry } from '../../../shared/schemas/alerts'
import { useMe } from '../../api/auth'
import { Mark, severityMark } from '../../components/ui/mark'
import { SectionHead } from '../../components/ui/page'
import { useNow } from '../../hooks/use-now'
import { ageWords, hoursSince } from '../../lib/age'
import { clockTime, localDay, shortDay } from '../../lib/dates'
import { entryWords } from './entry-words'

/** Newest first; what is overdue stands on top, in ember. */
export function Timeline({ alert }: { alert: Alert }) {
  const now = useNow()
  const zone = useMe()?.timeZone ?? 'UTC'
  const entries = [...alert.entries].sort((a, b) => Date.parse(b.at) - Date.parse(a.at) || b.id - a.id)
  const today = localDay(now, zone)
  const when = (at: string) => (localDay(at, zone) === today ? clockTime(at, zone) : shortDay(localDay(at, zone)))
  return (
    <section aria-label="What happened">
      <SectionHead>What happened</SectionHead>
      <ol className="relative pt-3">
        {alert.state === 'open' && (
          <li className="grid grid-cols-[3.75rem_1.5rem_minmax(0,1fr)] gap-x-3 pb-3 font-strong text-ember">
            <span className="fig text-right text-small leading-6">{clockTime(now, zone)}</span>
            <Dot className="bg-ember" />
            <span>Not acknowledged for {ageWords(hoursSince(alert.raisedAt, now))}.</span>
          </li>
        )}
        {entries.map((entry, index) => (
          <li key={entry.id} className="grid grid-cols-[3.75rem_1.5rem_minmax(0,1fr)] gap-x-3">
            <time dateTime={entry.at} title={`${shortDay(localDay(entry.at, zone))} ${clockTime(entry.at, zone)}`} className="fig text-right text-small leading-6 text-ink2">
              {when(entry.at)}
            </time>
            <span className="grid grid-rows-[1.5rem_1fr] justify-items-center">
              <EntryMark entry={entry} alert={alert} />
              {index < entries.length - 1 && <span aria-hidden className="w-px bg-rule2" />}
            </span>
            <span className="min-w-0 pb-3 [overflow-wrap:anywhere]">
              {entryWords(entry, zone)}
              {entry.by && <span className="block text-small text-ink2">{entry.by}</span>}
            </span>
          </li>
        ))}
      </ol>
    </section>
  )
}

function EntryMark({ entry, alert }: { entry: AlertEntry; alert: Alert }) {
  if (entry.kind === 'raised' || entry.kind === 'rose' || entry.kind === 'resumed') return <Mark name={severityMark(alert.severity)} size={18} className="self-center text-ember" />
  if (entry.kind === 'ended') return <Mark name="state-usual" size={18} className="self-center" />
  if (entry.kind === 'lost') return <Mark name="state-not-seen" size={18} className="self-center" />
  const byPerson = entry.by !== null
  return <Dot className={byPerson ? 'bg-ink' : 'border-2 border-ink bg-paper'} />
}

function Dot({ className }: { className: string }) {
  return (
    <span className="grid h-6 place-items-center justify-self-center">
      <span aria-hidden className={`size-2.5 rounded-round ${className}`} />
    </span>
  )
}
