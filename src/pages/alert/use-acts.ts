import { useState } from 'react'
import type { z } from 'zod'
import type * as alerts from '../../../shared/schemas/alerts'
import { useAcknowledge, useAddNote, useAssign, useClose, useHold, useReopen } from '../../api/alerts'

export type DialogName = 'assign' | 'hold' | 'close' | 'reopen' | 'more'

export type Acting = ReturnType<typeof useActs>

/**
 * Everything a person can do to an alert. Each act carries the version that was on screen; the note typed meanwhile
 * goes with the acknowledgement and is kept when the act is refused.
 */
export function useActs(alert: alerts.Alert) {
  const acknowledge = useAcknowledge(alert.id)
  const addNote = useAddNote(alert.id)
  const assign = useAssign(alert.id)
  const hold = useHold(alert.id)
  const close = useClose(alert.id)
  const reopen = useReopen(alert.id)
  const [note, setNote] = useState('')
  const [dialog, setDialog] = useState<DialogName>()
  const all = [acknowledge, addNote, assign, hold, close, reopen]
  const { version } = alert
  const done = { onSuccess: () => setDialog(undefined) }
  const noted = { onSuccess: () => setNote('') }
  const fresh = () => all.forEach((act) => act.reset())

  return {
    note,
    setNote,
    dialog,
    show: (name: DialogName | undefined) => {
      fresh()
      setDialog(name)
    },
    busy: all.some((act) => act.isPending),
    error: all.find((act) => act.error)?.error ?? null,
    dismiss: fresh,
    acknowledge: () => acknowledge.mutate({ note, version }, noted),
    addNote: () => addNote.mutate({ text: note, version }, noted),
    assign: (userId: number | null) => assign.mutate({ userId, version }, done),
    hold: (body: z.input<typeof alerts.hold>) => hold.mutate({ ...body, version }, done),
    close: (body: z.input<typeof alerts.closing>) => close.mutate({ ...body, version }, done),
    reopen: (body: z.input<typeof alerts.reopening>) => reopen.mutate({ ...body, version }, done),
  }
}
