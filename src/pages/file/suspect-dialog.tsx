import { useState } from 'react'
import type { Layer } from '../../../shared/schemas/layers'
import { sentenceOf } from '../../api/api-error'
import { useMarkSuspect } from '../../api/layers'
import { Button } from '../../components/ui/button'
import { Dialog } from '../../components/ui/dialog'
import { TextArea } from '../../components/ui/field'
import { Message } from '../../components/ui/message'

/** A suspect layer stays, but its days are judged without it; both ways are kept in the audit. */
export function SuspectDialog({ layer, onClose }: { layer: Layer; onClose: () => void }) {
  const mark = useMarkSuspect(layer.id)
  const [note, setNote] = useState('')
  const suspect = layer.suspect === null
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={suspect ? 'Mark this layer suspect' : 'Take the suspicion back'}
      about={suspect ? 'Its days are judged again without it. The layer is kept.' : 'Its days are judged again with it.'}
    >
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault()
          mark.mutate({ suspect, note: note.trim() }, { onSuccess: onClose })
        }}
      >
        <TextArea label="Why" value={note} maxLength={1000} onChange={(event) => setNote(event.target.value)} />
        {mark.error && <Message fault>{sentenceOf(mark.error)}</Message>}
        <div className="flex justify-end gap-3">
          <Button onClick={onClose}>Leave it</Button>
          <Button kind="filled" type="submit" disabled={mark.isPending}>
            {suspect ? 'Mark suspect' : 'Take back'}
          </Button>
        </div>
      </form>
    </Dialog>
  )
}
