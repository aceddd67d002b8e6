import { useState } from 'react'
import { unitWords } from '../../../shared/figure-text'
import type { RegionView } from '../../../shared/schemas/patches'
import { threeDigits } from '../../lib/format'
import { Button } from '../ui/button'
import { Table, Td, Th, Tr } from '../ui/table'
import { inUnit, squareKm } from './patch-words'
import { valueAxis, type ValueAxis } from './value-axis'

/** Nothing in these rows is pressed: they may stand close. */
const row = 'h-8! py-1!'

/** How much water has which value, on a log axis with the level marked; the same as a table. */
export function AreaByValue({ shown }: { shown: RegionView }) {
  const [asTable, setAsTable] = useState(false)
  const { view, unit } = shown
  const { level } = shown.level
  if (!view || view.histogram.length === 0) return null
  const axis = valueAxis(view.histogram, level)
  const above = view.areaAboveKm2
  const share = above !== null && view.validAreaKm2 > 0 ? ` of ${squareKm(view.validAreaKm2)} seen` : ''
  const aboveWords = above === null ? 'The level lies beyond what is counted by value.' : `${squareKm(above)}${share} at or above ${inUnit(level, unit)}.`
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] content-start gap-2">
      <div className="flex flex-wrap items-baseline justify-between gap-x-4">
        <h3 className="text-body font-heading">Area by value</h3>
        <Button kind="text" size="small" aria-expanded={asTable} onClick={() => setAsTable(!asTable)}>
          {asTable ? 'Hide table' : 'Table'}
        </Button>
      </div>
      {axis && <Instrument axis={axis} level={level} label={`Area by value. ${aboveWords}`} />}
      <p className="text-small text-ink2">
        {aboveWords} Values{unit && unit !== '1' && ` in ${unitWords(unit)}`}, logarithmic, 20 bins a decade; the strong bars are at or above the level.
        {axis && axis.belowKm2 > 0 && ` Not drawn: ${squareKm(axis.belowKm2)} below 0.001, zero or negative.`}
        {axis && axis.aboveKm2 > 0 && ` Not drawn: ${squareKm(axis.aboveKm2)} from 1000 on.`}
      </p>
      {asTable && (
        <div className="max-h-80 overflow-y-auto border-b border-rule">
          <Table label="Area by value">
            <thead>
              <tr>
                <Th figures>From{unit && unit !== '1' && `, ${unitWords(unit)}`}</Th>
                <Th figures>To</Th>
                <Th figures>Area, km²</Th>
              </tr>
            </thead>
            <tbody>
              {view.histogram.map((bin) => (
                <Tr key={bin.from ?? 'below'}>
                  <Td figures className={row}>
                    {bin.from === null ? '' : threeDigits(bin.from)}
                  </Td>
                  <Td figures className={row}>
                    {bin.to === null ? '' : threeDigits(bin.to)}
                  </Td>
                  <Td figures className={row}>
                    {threeDigits(bin.areaKm2)}
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

function Instrument({ axis, level, label }: { axis: ValueAxis; level: number; label: string }) {
  const { bins, place, ticks } = axis
  const most = Math.max(...bins.map((bin) => bin.areaKm2))
  const at = place(level)
  return (
    <div className="relative mx-[7px] pt-5">
      <div aria-hidden className="fig absolute top-0 h-5 text-fine whitespace-nowrap text-ink" style={{ left: `${at * 100}%`, transform: `translateX(${at < 0.15 ? 0 : at > 0.85 ? -100 : -50}%)` }}>
        level {threeDigits(level)}
      </div>
      <div className="relative h-24">
        <svg role="img" aria-label={label} className="block size-full" viewBox="0 0 1000 100" preserveAspectRatio="none" shapeRendering="crispEdges">
          {bins.map(({ from, to, areaKm2 }) => {
            const [left, right] = [place(from) * 1000, place(to) * 1000]
            const height = areaKm2 === 0 ? 0 : Math.max(1.5, (areaKm2 / most) * 98)
            // The bin that holds the level counts with the upper ones when most of it does.
            return <rect key={from} x={left + 0.5} y={100 - height} width={Math.max(0.5, right - left - 1)} height={height} fill={Math.sqrt(from * to) >= level ? 'var(--ink)' : 'var(--rule2)'} />
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
            <span key={tick.at} className={`absolute whitespace-nowrap ${tick.share < 0.03 ? '' : tick.share > 0.97 ? '-translate-x-full' : '-translate-x-1/2'}`} style={{ left: `${tick.share * 100}%` }}>
              {threeDigits(tick.at)}
            </span>
          ))}
      </div>
    </div>
  )
}
