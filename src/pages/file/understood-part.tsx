import type { ReportVariable } from '../../../shared/schemas/files'
import { SectionHead } from '../../components/ui/page'
import { understoodRows } from './understood-rows'
import { UnderstoodTable } from './understood-table'

export function UnderstoodPart({ format, variable }: { format: string; variable: ReportVariable }) {
  return (
    <section>
      <SectionHead ruled={false}>What was understood, {variable.name}</SectionHead>
      <UnderstoodTable rows={understoodRows(format, variable)} label={`What was understood of ${variable.name}`} />
    </section>
  )
}
