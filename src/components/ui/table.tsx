import type { ComponentProps } from 'react'

/** Scrolls by itself where it is wider than the screen; the page never does. */
export function Table({ className = '', label, ...rest }: ComponentProps<'table'> & { label: string }) {
  return (
    <div className="relative overflow-x-auto" role="region" aria-label={label} tabIndex={0}>
      <table aria-label={label} className={`w-full border-collapse text-small ${className}`} {...rest} />
    </div>
  )
}

export function Th({ className = '', figures = false, ...rest }: ComponentProps<'th'> & { figures?: boolean }) {
  return (
    <th
      scope="col"
      className={`border-b border-ink py-2 pr-4 align-bottom text-fine font-text text-ink3 last:pr-0 ${figures ? 'text-right' : 'text-left'} ${className}`}
      {...rest}
    />
  )
}

export function Tr({ className = '', ...rest }: ComponentProps<'tr'>) {
  return <tr className={`border-b border-rule hover:bg-sunk ${className}`} {...rest} />
}

/** `figures` for numbers and units: mono cut, right-aligned. A missing figure is an empty cell. */
export function Td({ className = '', figures = false, ...rest }: ComponentProps<'td'> & { figures?: boolean }) {
  return <td className={`h-13 py-2 pr-4 last:pr-0 tab:h-11 ${figures ? 'fig text-right' : ''} ${className}`} {...rest} />
}
