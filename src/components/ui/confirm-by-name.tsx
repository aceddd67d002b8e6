import { useState, type ReactNode } from 'react'
import { Button } from './button'
import { Dialog } from './dialog'
import { TextField } from './field'
import { Message } from './message'

interface Props {
  open: boolean
  onOpenChange: (open: boolean) => void
  title: string
  /** What happens and what is kept. */
  about: ReactNode
  /** What has to be typed. */
  name: string
  /** The word on the button: "Retire Tarrow Bay". */
  act: string
  onConfirm: () => void
  busy?: boolean
  error?: string | undefined
}

/** A destructive act is confirmed by naming the thing. */
export function ConfirmByName({ open, onOpenChange, title, about, name, act, onConfirm, busy = false, error }: Props) {
  const [typed, setTyped] = useState('')
  const named = typed.trim().toLocaleLowerCase() === name.trim().toLocaleLowerCase()
  const change = (next: boolean) => {
    setTyped('')
    onOpenChange(next)
  }
  return (
    <Dialog open={open} onOpenChange={change} title={title} about={about}>
      <form
        className="grid gap-4"
        onSubmit={(event) => {
          event.preventDefault()
          if (named) onConfirm()
        }}
      >
        <TextField label={`Type ${name} to confirm`} value={typed} onChange={(event) => setTyped(event.target.value)} autoComplete="off" autoFocus />
        {error && <Message fault>{error}</Message>}
        <div className="flex justify-end gap-3">
          <Button onClick={() => change(false)}>Keep it</Button>
          <Button kind="danger" type="submit" disabled={!named || busy}>
            {act}
          </Button>
        </div>
      </form>
    </Dialog>
  )
}
