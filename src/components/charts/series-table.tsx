import { useState } from 'react'
import { dayWithYear } from '../../lib/dates'
import { unitWords } from '../../../shared/figure-text'
import { figure, percent, timesUsual } from '../../lib/format'
import { Button } from '../ui/button'
import { StateWord } from '../ui/mark'
import { Table, Td, Th, Tr } from '../ui/table'
import type { DayRow } from './day-rows'

const atOnce = 30

/** The same days as the chart above it. A day not seen has hatch where its figures would stand. */
export function SeriesTable({ rows, unit, label }: { rows: readonly DayRow[]; unit: string | null; label: string }) {
  const [shown, setShown] = useState(atOnce)
  return (
    <div className="grid gap-3">
      <Table label={label}>
        <thead>
          <tr>
            <Th>Day</Th>
            <Th figures>Value{unit && `, ${unitWords(unit)}`}</Th>
            <Th figures>Times usual</Th>
            <Th figures>Coverage</Th>
            <Th>State</Th>
          </tr>
        </thead>
        <tbody>
          {rows.slice(0, shown).map((row) => (
            <DayLine key={row.day} row={row} />
          ))}
        </tbody>
      </Table>
      {rows.length > shown && (
        <div>
          <Button kind="text" size="small" onClick={() => setShown(shown + 10 * atOnce)}>
            Show more of {rows.length} days
          </Button>
        </div>
      )}
    </div>
  )
}

function DayLine({ row }: { row: DayRow }) {
  const missing = row.value === null
  return (
    <Tr>
      <Td className="fig">{dayWithYear(row.day)}</Td>
      {missing ? (
        <Td colSpan={2}>
          <span aria-hidden className="hatch-fine ml-auto block h-3 max-w-60" />
        </Td>
      ) : (
        <>
          <Td figures>{figure(row.value)}</Td>
          <Td figures>{row.timesUsual !== null && timesUsual(row.timesUsual)}</Td>
        </>
      )}
      <Td figures>{row.coverage !== null && percent(row.coverage)}</Td>
      <Td>{row.state === 'above the threshold' ? row.state : <StateWord state={row.state} />}</Td>
    </Tr>
  )
}
