import type { FoundAxis } from '../../../shared/schemas/found'
import type { ReportVariable } from '../../../shared/schemas/files'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { dayWithYear } from '../../lib/dates'
import { grouped } from '../../lib/format'

const roleWords: Record<FoundAxis['role'], string> = {
  latitude: 'latitude', longitude: 'longitude', time: 'time', level: 'depth or level', projected: 'on the map projection', other: 'other',
}

/** The dimensions of a variable in the file's order, with what their coordinates say. */
export function AxesTable({ variable }: { variable: ReportVariable }) {
  const axes = variable.axes ?? []
  if (axes.length === 0) return null
  return (
    <Table label={`Axes of ${variable.name}`} className="min-w-[46rem]">
      <thead>
        <tr>
          <Th>Axis</Th>
          <Th>Role</Th>
          <Th figures>Count</Th>
          <Th figures>First</Th>
          <Th figures>Last</Th>
          <Th figures>Spacing</Th>
          <Th>Runs</Th>
          <Th>Units as found</Th>
        </tr>
      </thead>
      <tbody>
        {axes.map((axis) => (
          <Tr key={axis.dimension}>
            <Td className="fig whitespace-nowrap">{axis.coordinate && axis.coordinate !== axis.dimension ? `${axis.dimension} (${axis.coordinate})` : axis.dimension}</Td>
            <Td>{roleWords[axis.role]}</Td>
            <Td figures>{grouped(axis.size)}</Td>
            <Td figures className="whitespace-nowrap">{end(axis, axis.first, variable.times.first)}</Td>
            <Td figures className="whitespace-nowrap">{end(axis, axis.last, variable.times.last)}</Td>
            <Td figures>{axis.spacing !== null ? plainNumber(axis.spacing) : axis.size > 1 && axis.first !== null ? 'uneven' : ''}</Td>
            <Td>{axis.direction}</Td>
            <Td className="fig">{axis.unit ?? ''}</Td>
          </Tr>
        ))}
      </tbody>
    </Table>
  )
}

function end(axis: FoundAxis, value: number | null, instant: string | null): string {
  if (value === null) return ''
  const text = plainNumber(value)
  return axis.role === 'time' && instant ? `${text} (${dayWithYear(instant)})` : text
}

/** A coordinate as stored, without the noise of its type: places need more than three digits. */
function plainNumber(value: number): string {
  return String(Number(value.toPrecision(8))).replace('-', '−')
}
