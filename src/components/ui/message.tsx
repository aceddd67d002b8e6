import type { ReactNode } from 'react'
import { FaultMark } from './fault-mark'

interface Props {
  title?: ReactNode
  children?: ReactNode
  action?: ReactNode
  /** A fault has the square mark and is read out at once; news waits for a pause. */
  fault?: boolean
}

/** A sentence with a bar at its left: what happened, what was kept, what to do. */
export function Message({ title, children, action, fault = false }: Props) {
  return (
    <div role={fault ? 'alert' : 'status'} className="flex flex-wrap items-start gap-x-4 gap-y-2 border border-l-6 border-ink bg-sheet px-4 py-3">
      <div className="flex min-w-0 flex-1 basis-60 items-start gap-3">
        {fault && <FaultMark />}
        <div className="min-w-0">
          {title && <strong className="font-heading">{title} </strong>}
          {children}
        </div>
      </div>
      {action}
    </div>
  )
}
