import { useState } from 'react'
import type { FileReport, OffingFile } from '../../../shared/schemas/files'
import { KeptStrip } from './kept-strip'
import { UnderstoodPart } from './understood-part'
import { ValueHistogram } from './value-histogram'
import { VariablesPart } from './variables-part'

/** What was understood of a file, variable by variable: the one read first is shown first. */
export function FileContents({ file, report }: { file: OffingFile; report: FileReport }) {
  const [chosen, setChosen] = useState(report.feeds[0]?.variable)
  const shown = report.variables.find((one) => one.name === chosen) ?? report.variables[0]
  if (!shown) return null
  const hidden = (shown.masked ?? []).map(({ reason }) => reason)
  return (
    <>
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-8 desk:grid-cols-[minmax(0,1.35fr)_minmax(0,1fr)]">
        <UnderstoodPart format={report.format} variable={shown} timeFrom={report.feeds.find((one) => one.variable === shown.name)?.timeFrom} />
        <ValueHistogram variable={shown} />
      </div>
      {shown.found && <KeptStrip found={shown.found} hiddenFlags={hidden} gridCells={shown.grid.rows * shown.grid.columns} />}
      <VariablesPart file={file} shown={shown} onShow={setChosen} />
    </>
  )
}
