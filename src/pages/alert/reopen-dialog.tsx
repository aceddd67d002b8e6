import { useState } from 'react'
import type { Alert } from '../../../shared/schemas/alerts'
import { TextArea } from '../../components/ui/field'
import { ActForm } from './act-form'
import type { Acting } from './use-acts'

export function ReopenDialog({ alert, acts }: { alert: Alert; acts: Acting }) {
  const [note, setNote] = useState('')
  const [error, setError] = useState<string>()
  const send = () => (note.trim() ? acts.reopen({ note }) : setError('Say why it is reopened.'))
  return (
    <ActForm acts={acts} title={`Reopen ${alert.regionName}`} about="It is yours then: acknowledged and not closed." act="Reopen" onSubmit={send}>
      <TextArea label="Why" value={note} error={error} onChange={(event) => setNote(event.target.value)} />
    </ActForm>
  )
}
