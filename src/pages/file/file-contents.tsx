import { useState, type ReactNode } from 'react'
import type { FileReport, OffingFile } from '../../../shared/schemas/files'
import { KeptStrip } from './kept-strip'
import { UnderstoodPart } from './understood-part'
import { ValueHistogram } from './value-histogram'
import { VariablesPart } from './variables-part'

/** What was understood of one variable, first of one that was read; `children` is what came of it, before all the file holds. */
export function FileContents({ file, report, children }: { file: OffingFile; report: FileReport; children: ReactNode }) {
  const [chosen, setChosen] = useState<string>()
  const named = (name: string | undefined) => report.variables.find((one) => one.name === name)
  const shown = named(chosen) ?? named(report.feeds[0]?.variable) ?? report.variables[0]
  if (!shown) return children
  const hidden = (shown.masked ?? []).map(({ reason }) => reason)
  return (
    <>
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-8 desk:grid-cols-[minmax(0,1.35fr)_minmax(0,1fr)]">
        <UnderstoodPart format={report.format} variable={shown} timeFrom={report.feeds.find((one) => one.variable === shown.name)?.timeFrom} />
        <ValueHistogram variable={shown} />
      </div>
      {shown.found && <KeptStrip found={shown.found} hiddenFlags={hidden} gridCells={shown.grid.rows * shown.grid.columns} />}
      {children}
      <VariablesPart file={file} shown={shown} onShow={setChosen} />
    </>
  )
}
