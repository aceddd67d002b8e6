import type { ReactNode } from 'react'
import { sentenceOf } from '../../api/api-error'
import { Button } from '../../components/ui/button'
import { Dialog } from '../../components/ui/dialog'
import { Message } from '../../components/ui/message'

interface Props {
  title: string
  about?: string
  act: string
  busy: boolean
  error: unknown
  onSubmit: () => void
  onClose: () => void
  children: ReactNode
}

export function PersonDialog({ title, about, act, busy, error, onSubmit, onClose, children }: Props) {
  return (
    <Dialog open onOpenChange={(open) => !open && onClose()} title={title} about={about}>
      <form
        noValidate
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault()
          onSubmit()
        }}
      >
        {children}
        {error !== null && error !== undefined && <Message fault>{sentenceOf(error)}</Message>}
        <div className="flex justify-end gap-3">
          <Button onClick={onClose}>Leave it</Button>
          <Button kind="filled" type="submit" disabled={busy}>
            {act}
          </Button>
        </div>
      </form>
    </Dialog>
  )
}
