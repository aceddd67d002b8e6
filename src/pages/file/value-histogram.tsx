import { useState } from 'react'
import { figureText, unitWords } from '../../../shared/figure-text'
import type { FoundHistogram } from '../../../shared/schemas/found'
import type { ReportVariable } from '../../../shared/schemas/files'
import { ValueBars } from '../../components/charts/value-bars'
import { ValueBinsTable } from '../../components/charts/value-bins-table'
import { Button } from '../../components/ui/button'
import { SectionHead } from '../../components/ui/page'
import { countWords, grouped, threeDigits } from '../../lib/format'
import { axisTicks, binsOf, shareAlong } from './histogram-bins'

/** How often each value comes in the first step, with its median marked; the same as a table. */
export function ValueHistogram({ variable }: { variable: ReportVariable }) {
  const [asTable, setAsTable] = useState(false)
  const { histogram, unit, cells, grid } = variable
  if (!histogram) return null
  const bins = binsOf(histogram)
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] content-start gap-2">
      <SectionHead
        ruled={false}
        aside={
          bins.length > 0 && (
            <Button kind="text" size="small" aria-expanded={asTable} onClick={() => setAsTable(!asTable)}>
              {asTable ? 'Hide table' : 'Table'}
            </Button>
          )
        }
      >
        Values of the first step
      </SectionHead>
      {bins.length > 0 && <Instrument histogram={histogram} label={`${variable.name}: cells by value, ${spanWords(histogram, unit)}`} />}
      <p className="text-small text-ink2">
        {unitText(unit, histogram.scale)} {binWords(histogram)} {spanWords(histogram, unit)}. {beyondWords(histogram)}
        {cells < grid.rows * grid.columns && `Looked at: ${grouped(cells)} of ${grouped(grid.rows * grid.columns)} cells, in bands of rows from first to last. `}
        {variable.flags && variable.flags.length > 0 && 'Cells count whatever flags they carry.'}
      </p>
      {asTable && <ValueBinsTable label={`Cells by value of ${variable.name}`} unit={unit} amount="Cells" bins={bins.map(({ from, to, cells: count }) => ({ from, to, text: grouped(count) }))} />}
    </section>
  )
}

function Instrument({ histogram, label }: { histogram: FoundHistogram; label: string }) {
  const { counts, median } = histogram
  const bars = counts.map((amount, i) => ({ from: i / counts.length, to: (i + 1) / counts.length, amount, fill: 'var(--ink2)' }))
  const ticks = axisTicks(histogram).map(({ at, share, labelled }) => ({ share, text: labelled ? figureText(at).replace('-', '−') : '' }))
  return <ValueBars label={label} bars={bars} ticks={ticks} mark={{ share: shareAlong(histogram, median), text: `median ${threeDigits(median)}` }} />
}

function unitText(unit: string | null, scale: FoundHistogram['scale']): string {
  return `${unit ? unitWords(unit) : 'No unit'}, ${scale === 'log10' ? 'logarithmic' : 'linear'}.`
}

function binWords({ scale, step }: FoundHistogram): string {
  return scale === 'log10' ? 'Bars: cells by value, 20 bins a decade.' : `Bars: cells by value, bins of ${figureText(step)}.`
}

function spanWords({ p10, median, p90 }: FoundHistogram, unit: string | null): string {
  return `Median ${threeDigits(median)}, p10 ${threeDigits(p10)}, p90 ${threeDigits(p90)}${unit ? ` ${unitWords(unit)}` : ''}`
}

function beyondWords({ scale, below, above }: FoundHistogram): string {
  const low = scale === 'log10' ? 'below 0.001, zero or negative' : 'below'
  const words = [...(below > 0 ? [`${countWords(below, 'cell')} ${low}`] : []), ...(above > 0 ? [`${countWords(above, 'cell')} above`] : [])]
  return words.length > 0 ? `Not drawn: ${words.join(', ')}. ` : ''
}
