import { useState } from 'react'
import type { Rule } from '../../../shared/schemas/rules'
import { sentenceOf } from '../../api/api-error'
import { useActivateRule } from '../../api/rules'
import { Button } from '../../components/ui/button'
import { Dialog } from '../../components/ui/dialog'
import { TextArea } from '../../components/ui/field'
import { Message } from '../../components/ui/message'

/** Switching a version on is kept with the reason; open events keep the version they began with. */
export function ActivateRule({ rule, ruleVersion, onClose }: { rule: Rule; ruleVersion: number; onClose: () => void }) {
  const activate = useActivateRule(rule.id)
  const [note, setNote] = useState('')
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={`Switch on version ${ruleVersion}`}
      about="The views are judged again by it. An event that is open keeps the version it began with."
    >
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault()
          activate.mutate({ ruleVersion, note: note.trim() }, { onSuccess: onClose })
        }}
      >
        <TextArea label="Why" hint="Kept with the version." value={note} maxLength={500} onChange={(event) => setNote(event.target.value)} />
        {activate.error && <Message fault>{sentenceOf(activate.error)}</Message>}
        <div className="flex justify-end gap-3">
          <Button onClick={onClose}>Leave it off</Button>
          <Button kind="filled" type="submit" disabled={activate.isPending}>
            Switch on
          </Button>
        </div>
      </form>
    </Dialog>
  )
}
