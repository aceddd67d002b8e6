import type { FormEvent, ReactNode } from 'react'
import { Button } from '../../components/ui/button'
import { Dialog } from '../../components/ui/dialog'
import { ActError } from './act-error'
import type { Acting } from './use-acts'

interface Props {
  acts: Acting
  title: string
  about?: string
  /** The word on the button. */
  act: string
  onSubmit: (event: FormEvent) => void
  children: ReactNode
}

/** What all dialogs of an alert share: a form, the error of the act, a way back and a way on. */
export function ActForm({ acts, title, about, act, onSubmit, children }: Props) {
  const leave = () => acts.show(undefined)
  return (
    <Dialog open onOpenChange={(open) => !open && leave()} title={title} about={about}>
      <form
        noValidate
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault()
          onSubmit(event)
        }}
      >
        {children}
        <ActError acts={acts} />
        <div className="flex justify-end gap-3">
          <Button onClick={leave}>Leave it</Button>
          <Button kind="filled" type="submit" disabled={acts.busy}>
            {act}
          </Button>
        </div>
      </form>
    </Dialog>
  )
}
