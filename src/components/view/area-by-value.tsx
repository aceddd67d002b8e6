import { useState } from 'react'
import { unitWords } from '../../../shared/figure-text'
import type { RegionView } from '../../../shared/schemas/patches'
import { threeDigits } from '../../lib/format'
import { ValueBars, type ValueBar } from '../charts/value-bars'
import { ValueBinsTable } from '../charts/value-bins-table'
import { Button } from '../ui/button'
import { inUnit, squareKm } from './patch-words'
import { valueAxis, type ValueAxis } from './value-axis'

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
      {axis && (
        <ValueBars
          label={`Area by value. ${aboveWords}`}
          bars={barsOf(axis, level)}
          ticks={axis.ticks.map(({ at, share, labelled }) => ({ share, text: labelled ? threeDigits(at) : '' }))}
          mark={{ share: axis.place(level), text: `level ${threeDigits(level)}` }}
        />
      )}
      <p className="text-small text-ink2">
        {aboveWords} Values{unit && unit !== '1' && ` in ${unitWords(unit)}`}, logarithmic, 20 bins a decade; the strong bars are at or above the level.
        {axis && axis.belowKm2 > 0 && ` Not drawn: ${squareKm(axis.belowKm2)} below 0.001, zero or negative.`}
        {axis && axis.aboveKm2 > 0 && ` Not drawn: ${squareKm(axis.aboveKm2)} from 1000 on.`}
      </p>
      {asTable && (
        <ValueBinsTable label="Area by value" unit={unit} amount="Area, km²" bins={view.histogram.map(({ from, to, areaKm2 }) => ({ from, to, text: threeDigits(areaKm2) }))} />
      )}
    </section>
  )
}

/** The bin that holds the level counts with the upper ones when most of it does. */
function barsOf({ bins, place }: ValueAxis, level: number): ValueBar[] {
  return bins.map(({ from, to, areaKm2 }) => ({ from: place(from), to: place(to), amount: areaKm2, fill: Math.sqrt(from * to) >= level ? 'var(--ink)' : 'var(--rule2)' }))
}
