import type { Alert } from '../../../shared/schemas/alerts'
import { useCan } from '../../api/auth'
import { Button } from '../../components/ui/button'
import { TextArea } from '../../components/ui/field'
import type { Acting } from './use-acts'

/** What was seen, said or done: goes with the acknowledgement when there is one to give, or alone. */
export function NoteForm({ alert, acts }: { alert: Alert; acts: Acting }) {
  const mayAct = useCan('alert:act')
  if (!useCan('alert:note')) return null
  const goesAlong = alert.state === 'open' && mayAct
  return (
    <form
      className="grid gap-3"
      data-no-print
      onSubmit={(event) => {
        event.preventDefault()
        acts.addNote()
      }}
    >
      <TextArea
        label="Note"
        placeholder="What was seen, said or done"
        hint={goesAlong ? 'Goes with Acknowledge when you press that, or alone.' : undefined}
        value={acts.note}
        maxLength={4000}
        onChange={(event) => acts.setNote(event.target.value)}
      />
      <div>
        <Button type="submit" disabled={acts.busy || acts.note.trim() === ''}>
          Add the note
        </Button>
      </div>
    </form>
  )
}
