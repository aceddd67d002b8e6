import { useState } from 'react'
import type { Alert } from '../../../shared/schemas/alerts'
import { useMe } from '../../api/auth'
import { SelectField, TextArea } from '../../components/ui/field'
import { useNow } from '../../hooks/use-now'
import { dayAndTime, zoneWord } from '../../lib/dates'
import { ActForm } from './act-form'
import type { Acting } from './use-acts'

const spans = [
  { hours: 1, words: '1 hour' },
  { hours: 4, words: '4 hours' },
  { hours: 12, words: '12 hours' },
  { hours: 24, words: '1 day' },
  { hours: 72, words: '3 days' },
  { hours: 168, words: '7 days' },
]

export function HoldDialog({ alert, acts }: { alert: Alert; acts: Acting }) {
  const zone = useMe()?.timeZone ?? 'UTC'
  const now = useNow()
  const [hours, setHours] = useState('12')
  const [reason, setReason] = useState('')
  const [error, setError] = useState<string>()
  const until = new Date(now + Number(hours) * 3_600_000).toISOString()
  const send = () => (reason.trim() ? acts.hold({ until, reason }) : setError('Say why it is held.'))
  return (
    <ActForm acts={acts} title={`Hold ${alert.regionName}`} about="Nobody is reminded of it until then; new views go on being judged." act="Hold" onSubmit={send}>
      <SelectField label="For" value={hours} onChange={(event) => setHours(event.target.value)} hint={`until ${dayAndTime(until, zone)} ${zoneWord(until, zone)}`}>
        {spans.map((span) => (
          <option key={span.hours} value={span.hours}>
            {span.words}
          </option>
        ))}
      </SelectField>
      <TextArea label="Why" value={reason} error={error} onChange={(event) => setReason(event.target.value)} />
    </ActForm>
  )
}
