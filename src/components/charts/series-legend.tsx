import { unitWords } from '../../../shared/figure-text'
import { statisticWords } from './statistic-words'
import type { Statistic } from './series-days'

/** The key of a series chart, drawn as the chart draws it. */
export function SeriesLegend({ unit, statistic, threshold }: { unit: string | null; statistic: Statistic; threshold: boolean }) {
  return (
    <ul className="flex flex-wrap items-center gap-x-5 gap-y-1 text-small text-ink2">
      <li>{[unitWords(unit), statisticWords(statistic)].filter(Boolean).join(', ')}</li>
      <Item sample={<rect width="24" height="12" fill="var(--band)" />}>usual band, p10 to p90</Item>
      <Item sample={<path d="M0 6h24" stroke="var(--ink2)" strokeDasharray="1.5 3" />}>usual</Item>
      {threshold && <Item sample={<path d="M0 6h24" stroke="var(--ember)" strokeWidth="1.3" strokeDasharray="5 3" />}>threshold</Item>}
      <Item sample={<circle cx="12" cy="6" r="3" fill="var(--ink)" />}>usable view</Item>
      <Item sample={<circle cx="12" cy="6" r="2.8" fill="none" stroke="var(--ink2)" />}>below the coverage floor</Item>
      <li className="flex items-center gap-2">
        <span aria-hidden className="hatch-fine h-3 w-6 border border-rule2" /> not seen
      </li>
      <Item sample={<rect width="24" height="12" fill="var(--emberTint)" />}>event; paler: start not known better</Item>
    </ul>
  )
}

function Item({ sample, children }: { sample: React.ReactNode; children: React.ReactNode }) {
  return (
    <li className="flex items-center gap-2">
      <svg aria-hidden width="24" height="12" viewBox="0 0 24 12">
        {sample}
      </svg>
      {children}
    </li>
  )
}
