import type { ReactNode } from 'react'
import { grouped } from '../../lib/format'

interface Props {
  done: number
  total: number
  /** What is being done: "Reading history". */
  label: string
  /** What is counted: "layers". */
  unit?: string
  action?: ReactNode
}

/** Long work, as a rule that fills. */
export function Progress({ done, total, label, unit, action }: Props) {
  const share = total > 0 ? Math.min(1, done / total) : 0
  return (
    <div className="grid gap-1">
      <div
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={total}
        aria-valuenow={done}
        className="h-2 border border-ink bg-paper"
      >
        <div className="h-full bg-ink" style={{ width: `${share * 100}%` }} />
      </div>
      <p className="flex flex-wrap gap-x-3 text-small text-ink2">
        <span>
          {label}, <span className="fig">{Math.floor(share * 100)} %</span>
          {unit && (
            <>
              , <span className="fig">{grouped(done)}</span> of <span className="fig">{grouped(total)}</span> {unit}
            </>
          )}
        </span>
        {action}
      </p>
    </div>
  )
}
