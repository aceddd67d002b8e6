import { useState } from 'react'
import { sentenceOf } from '../../api/api-error'
import { useCreateToken } from '../../api/tokens'
import { Button } from '../../components/ui/button'
import { SelectField, TextField } from '../../components/ui/field'
import { Message } from '../../components/ui/message'
import { CopyText } from './copy-text'

const lives = [
  { days: '30', label: '30 days' },
  { days: '365', label: '1 year' },
  { days: '', label: 'until it is revoked' },
]

/** The token itself is shown once; only its fingerprint is kept. */
export function NewToken({ onDone }: { onDone: () => void }) {
  const create = useCreateToken()
  const [name, setName] = useState('')
  const [days, setDays] = useState('365')
  if (create.data) {
    return (
      <Message
        title="Copy it now: it is not shown again."
        action={
          <Button size="small" onClick={onDone}>
            I have it
          </Button>
        }
      >
        <CopyText text={create.data.token} />
      </Message>
    )
  }
  return (
    <form
      className="grid max-w-2xl gap-4 border-l-6 border-ink pl-4"
      onSubmit={(event) => {
        event.preventDefault()
        create.mutate({ name: name.trim(), expiresInDays: days === '' ? null : Number(days) })
      }}
    >
      <div className="grid gap-4 tab:grid-cols-2">
        <TextField label="Name" hint="What uses it" required maxLength={100} value={name} onChange={(event) => setName(event.target.value)} />
        <SelectField label="Holds" value={days} onChange={(event) => setDays(event.target.value)}>
          {lives.map((life) => (
            <option key={life.days} value={life.days}>
              {life.label}
            </option>
          ))}
        </SelectField>
      </div>
      {create.error && <Message fault>{sentenceOf(create.error)}</Message>}
      <div className="flex flex-wrap gap-4">
        <Button type="submit" disabled={create.isPending || name.trim() === ''}>
          Make it
        </Button>
        <Button kind="text" onClick={onDone}>
          Leave it
        </Button>
      </div>
    </form>
  )
}
