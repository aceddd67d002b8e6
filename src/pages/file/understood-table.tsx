import type { ReactNode } from 'react'
import { Table, Th } from '../../components/ui/table'
import type { UnderstoodRow } from './understood-rows'

/** Three columns: item, understood as, how we know. Only rows that ask for an answer are tinted, and they come as children. */
export function UnderstoodTable({ rows, label, children }: { rows: readonly UnderstoodRow[]; label: string; children?: ReactNode }) {
  return (
    <Table label={label}>
      <thead>
        <tr>
          <Th>Item</Th>
          <Th>Understood as</Th>
          <Th colSpan={2}>How we know</Th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.item} className="border-b border-rule align-baseline">
            <td className="py-2.5 pr-4 text-ink2">{row.item}</td>
            <td className={`py-2.5 pr-4 text-body font-label ${row.mono ? 'fig' : ''}`}>{row.understood}</td>
            <td className="py-2.5 pr-4 font-strong whitespace-nowrap">
              {row.how === 'worked out' ? <span className="border-b border-dotted border-ink">{row.how}</span> : row.how}
            </td>
            <td className="py-2.5 text-ink2">{row.note}</td>
          </tr>
        ))}
        {children}
      </tbody>
    </Table>
  )
}

/** A row with a control: the file does not say it, somebody must. */
export function PleaseSay({ item, children, note }: { item: string; children: ReactNode; note: ReactNode }) {
  return (
    <tr className="border-b border-rule bg-accentTint align-baseline">
      <td className="py-2.5 pr-4 pl-3 text-ink2">{item}</td>
      <td className="min-w-56 py-2.5 pr-4">{children}</td>
      <td className="py-2.5 pr-4 font-strong whitespace-nowrap text-accent">please say</td>
      <td className="py-2.5 pr-3 text-ink2">{note}</td>
    </tr>
  )
}
