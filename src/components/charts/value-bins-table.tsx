import { unitWords } from '../../../shared/figure-text'
import { threeDigits } from '../../lib/format'
import { Table, Td, Th, Tr } from '../ui/table'

/** Nothing in these rows is pressed: they may stand close. */
const row = 'h-8! py-1!'

interface Props {
  label: string
  unit: string | null
  /** What is counted: "Cells", "Area, km²". */
  amount: string
  /** Null for an end that is open. */
  bins: { from: number | null; to: number | null; text: string }[]
}

/** The bins of an instrument as a table. */
export function ValueBinsTable({ label, unit, amount, bins }: Props) {
  return (
    <div className="max-h-80 overflow-y-auto border-b border-rule">
      <Table label={label}>
        <thead>
          <tr>
            <Th figures>From{unit && unit !== '1' && `, ${unitWords(unit)}`}</Th>
            <Th figures>To</Th>
            <Th figures>{amount}</Th>
          </tr>
        </thead>
        <tbody>
          {bins.map(({ from, to, text }) => (
            <Tr key={from ?? 'below'}>
              {[from === null ? '' : threeDigits(from), to === null ? '' : threeDigits(to), text].map((figure, column) => (
                <Td key={column} figures className={row}>
                  {figure}
                </Td>
              ))}
            </Tr>
          ))}
        </tbody>
      </Table>
    </div>
  )
}
