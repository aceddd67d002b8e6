import { useState } from 'react'
import { figureText, unitWords } from '../../../shared/figure-text'
import type { FoundHistogram } from '../../../shared/schemas/found'
import type { ReportVariable } from '../../../shared/schemas/files'
import { Button } from '../../components/ui/button'
import { SectionHead } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { countWords, grouped, threeDigits } from '../../lib/format'
import { axisTicks, binsOf, shareAlong } from './histogram-bins'

/** Nothing in these rows is pressed: they may stand close. */
const row = 'h-8! py-1!'

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
      {asTable && (
        <div className="max-h-80 overflow-y-auto border-b border-rule">
          <Table label={`Cells by value of ${variable.name}`}>
            <thead>
              <tr>
                <Th figures>From{unit && `, ${unitWords(unit)}`}</Th>
                <Th figures>To</Th>
                <Th figures>Cells</Th>
              </tr>
            </thead>
            <tbody>
              {bins.map((bin) => (
                <Tr key={bin.from}>
                  <Td figures className={row}>
                    {threeDigits(bin.from)}
                  </Td>
                  <Td figures className={row}>
                    {threeDigits(bin.to)}
                  </Td>
                  <Td figures className={row}>
                    {grouped(bin.cells)}
                  </Td>
                </Tr>
              ))}
            </tbody>
          </Table>
        </div>
      )}
    </section>
  )
}

function Instrument({ histogram, label }: { histogram: FoundHistogram; label: string }) {
  const { counts, median } = histogram
  const most = Math.max(...counts)
  const ticks = axisTicks(histogram)
  const at = shareAlong(histogram, median)
  return (
    <div className="relative mx-[7px] pt-5">
      <div aria-hidden className="fig absolute top-0 h-5 text-fine whitespace-nowrap text-ink" style={{ left: `${at * 100}%`, transform: `translateX(${at < 0.15 ? 0 : at > 0.85 ? -100 : -50}%)` }}>
        median {threeDigits(median)}
      </div>
      <div className="relative h-28">
        <svg role="img" aria-label={label} className="block size-full" viewBox={`0 0 ${counts.length} 100`} preserveAspectRatio="none" shapeRendering="crispEdges">
          {counts.map((count, i) => {
            const height = count === 0 ? 0 : Math.max(1, (count / most) * 98)
            return <rect key={i} x={i + 0.06} y={100 - height} width={0.88} height={height} fill="var(--ink2)" />
          })}
        </svg>
        <span aria-hidden className="absolute top-0 bottom-0 w-[3px] -translate-x-1/2 border-x border-paper bg-ink" style={{ left: `${at * 100}%` }} />
      </div>
      <div aria-hidden className="relative h-2 border-t border-ink">
        {ticks.map((tick) => (
          <span key={tick.at} className={`absolute top-0 w-px bg-ink2 ${tick.labelled ? 'h-2' : 'h-1'}`} style={{ left: `${tick.share * 100}%` }} />
        ))}
      </div>
      <div aria-hidden className="fig relative h-5 text-small text-ink2">
        {ticks
          .filter((tick) => tick.labelled)
          .map((tick) => (
            <span
              key={tick.at}
              className={`absolute whitespace-nowrap ${tick.share < 0.03 ? '' : tick.share > 0.97 ? '-translate-x-full' : '-translate-x-1/2'}`}
              style={{ left: `${tick.share * 100}%` }}
            >
              {figureText(tick.at).replace('-', '−')}
            </span>
          ))}
      </div>
    </div>
  )
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
