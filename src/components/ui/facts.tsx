import type { ReactNode } from 'react'

/** Names and what they stand for, a hairline below each. */
export function Facts({ className = '', children }: { className?: string; children: ReactNode }) {
  return <dl className={`grid grid-cols-[auto_minmax(0,1fr)] text-small ${className}`}>{children}</dl>
}

export function Fact({ name, className = '', children }: { name: string; className?: string; children: ReactNode }) {
  return (
    <>
      <dt className="border-b border-rule py-2 pr-6 text-ink2">{name}</dt>
      <dd className={`border-b border-rule py-2 ${className}`}>{children}</dd>
    </>
  )
}
