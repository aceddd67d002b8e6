import type { ReactNode } from 'react'

/** An empty place says what belongs there and offers the next step. */
export function Empty({ title, children, action }: { title: string; children?: ReactNode; action?: ReactNode }) {
  return (
    <div className="bg-sunk px-5 py-6">
      <div aria-hidden className="mb-4 border-t border-ink" />
      <p>
        <strong className="font-heading">{title}</strong> {children}
      </p>
      {action && <div className="mt-3 flex flex-wrap gap-3">{action}</div>}
    </div>
  )
}
