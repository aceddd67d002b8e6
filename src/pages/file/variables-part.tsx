import type { FeedProposal } from '../../../shared/schemas/feeds'
import type { OffingFile, ReportVariable } from '../../../shared/schemas/files'
import { unitWords } from '../../../shared/figure-text'
import { Button } from '../../components/ui/button'
import { SectionHead } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { AttributeList } from './attribute-list'
import { AxesTable } from './axes-table'

interface Props {
  file: OffingFile
  shown: ReportVariable
  onShow: (name: string) => void
}

/** Everything the file holds, and of the variable shown its axes and attributes. */
export function VariablesPart({ file, shown, onShow }: Props) {
  const { report } = file
  if (!report) return null
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-4">
      <div>
        <SectionHead ruled={false} count={report.variables.length}>
          Variables
        </SectionHead>
        <Table label="Variables of this file" role="table">
          <thead className="max-tab:hidden">
            <tr>
              <Th>Variable</Th>
              <Th>Described as</Th>
              <Th>Unit as found</Th>
              <Th>Use</Th>
              <Th>
                <span className="heard">Show</span>
              </Th>
            </tr>
          </thead>
          <tbody>
            {report.variables.map((variable) => (
              <Tr key={variable.name} role="row" className="max-tab:flex max-tab:flex-wrap max-tab:items-baseline">
                <Td role="cell" className="fig break-words max-tab:h-auto max-tab:w-3/4">{variable.name}</Td>
                <Td role="cell" className="max-tab:order-1 max-tab:h-auto max-tab:py-0">{variable.longName ?? ''}</Td>
                <Td role="cell" className="fig max-tab:order-1 max-tab:h-auto max-tab:py-0">{unitWords(variable.fileUnit)}</Td>
                <Td role="cell" className="text-ink2 max-tab:order-1 max-tab:h-auto max-tab:w-full max-tab:pt-0">{wordsOfUse(file, variable)}</Td>
                <Td role="cell" className="text-right max-tab:ml-auto max-tab:h-auto">
                  {variable.name === shown.name ? (
                    <span className="font-strong">shown</span>
                  ) : (
                    <Button kind="text" size="small" aria-label={`Show ${variable.name}`} onClick={() => onShow(variable.name)}>
                      Show
                    </Button>
                  )}
                </Td>
              </Tr>
            ))}
          </tbody>
        </Table>
      </div>
      {(shown.axes?.length ?? 0) > 0 && (
        <div>
          <SectionHead ruled={false}>
            Axes of <span className="fig">{shown.name}</span>
          </SectionHead>
          <AxesTable variable={shown} />
        </div>
      )}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-2">
        <AttributeList title={`Attributes of ${shown.name}`} attributes={shown.attributes} />
        <AttributeList title="Attributes of the file" attributes={report.attributes} />
      </div>
    </section>
  )
}

function wordsOfUse({ report, proposal, others }: OffingFile, { name, tellsOfAnother, quantity }: ReportVariable): string {
  const is = (one: FeedProposal) => one.variable === name
  if (report?.feeds.some((feed) => feed.variable === name)) return 'read'
  if (proposal && is(proposal)) return 'proposed'
  if (others.some(is)) return 'proposed beside it'
  if (tellsOfAnother) return 'never proposed: it tells of another variable'
  return quantity === 'other' ? 'not proposed: its quantity is not known here' : 'not read'
}
