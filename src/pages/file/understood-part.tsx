import type { ReportVariable } from '../../../shared/schemas/files'
import { SectionHead } from '../../components/ui/page'
import { understoodRows } from './understood-rows'
import { UnderstoodTable } from './understood-table'

interface Props {
  format: string
  variable: ReportVariable
  /** Where its time came from, if not from the file. */
  timeFrom?: string | undefined
}

export function UnderstoodPart({ format, variable, timeFrom }: Props) {
  return (
    <section>
      <SectionHead ruled={false}>What was understood, {variable.name}</SectionHead>
      <UnderstoodTable rows={understoodRows(format, variable, timeFrom)} label={`What was understood of ${variable.name}`} />
    </section>
  )
}
