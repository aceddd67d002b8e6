import type { ReactNode } from 'react'
import { Table, Th } from '../../components/ui/table'
import type { UnderstoodRow } from './understood-rows'

/** On a phone a row is two lines: item and answer, then how it is known. */
const stacked = 'max-tab:grid max-tab:grid-cols-[6.5rem_minmax(0,1fr)]'

/** Three columns: item, understood as, how we know. Only rows that ask for an answer are tinted, and they come as children. */
export function UnderstoodTable({ rows, label, children }: { rows: readonly UnderstoodRow[]; label: string; children?: ReactNode }) {
  return (
    <Table label={label} role="table">
      <thead className="max-tab:hidden">
        <tr>
          <Th>Item</Th>
          <Th>Understood as</Th>
          <Th colSpan={2}>How we know</Th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.item} role="row" className={`border-b border-rule align-baseline ${stacked}`}>
            <td role="cell" className="py-2.5 pr-4 text-ink2 max-tab:pb-0">{row.item}</td>
            <td role="cell" className={`py-2.5 pr-4 text-body font-label break-words max-tab:pb-0 ${row.mono ? 'fig' : ''}`}>{row.understood}</td>
            <td role="cell" className="py-2.5 pr-4 font-strong whitespace-nowrap max-tab:pt-0.5">
              {row.how === 'worked out' ? <span className="border-b border-dotted border-ink">{row.how}</span> : row.how}
            </td>
            <td role="cell" className="py-2.5 text-ink2 max-tab:pt-0.5">{row.note}</td>
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
    <tr role="row" className={`border-b border-rule bg-accentTint align-baseline ${stacked}`}>
      <td role="cell" className="py-2.5 pr-4 pl-3 text-ink2">{item}</td>
      <td role="cell" className="py-2.5 pr-4 max-tab:pb-0 tab:min-w-56">{children}</td>
      <td role="cell" className="py-2.5 pr-4 font-strong whitespace-nowrap text-accent max-tab:pl-3">please say</td>
      <td role="cell" className="py-2.5 pr-3 text-ink2">{note}</td>
    </tr>
  )
}
