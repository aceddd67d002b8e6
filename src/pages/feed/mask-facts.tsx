import type { ReactNode } from 'react'
import type { WaterMaskShown } from '../../../shared/schemas/masks'
import { Fact, Facts } from '../../components/ui/facts'
import { dayWithYear } from '../../lib/dates'
import { grouped, percent } from '../../lib/format'
import { maskMeaning, maskName, periodWords } from './mask-words'

/** What one mask says is water, and what it was made from. */
export function MaskFacts({ mask, cells }: { mask: WaterMaskShown; cells: number }) {
  const facts: [string, ReactNode][] = [
    [mask.inForce ? 'In force' : 'Shown, not in force', <b className="font-heading">{maskName(mask)}</b>],
    ['Water is', maskMeaning(mask)],
  ]
  if (mask.from) facts.push(['Layers of', <span className="tabular-nums">{periodWords(mask)}</span>])
  if (mask.layers !== null) facts.push([mask.kind === 'own' ? 'Layers asked' : 'Layers counted', <span className="fig">{grouped(mask.layers)}</span>])
  if (mask.waterCells !== null) {
    facts.push(['Water cells', <><span className="fig">{grouped(mask.waterCells)}</span> of <span className="fig">{grouped(cells)}</span>, {percent(mask.waterCells / cells)}</>])
    facts.push(['Against the outline', <><span className="fig">{grouped(mask.gained ?? 0)}</span> cells more water, <span className="fig">{grouped(mask.lost ?? 0)}</span> less</>])
  }
  if (mask.kind !== 'land outline') facts.push(['Made', `${dayWithYear(mask.madeAt)}${mask.madeBy ? ` for ${mask.madeBy}` : ''}`])
  if (mask.inForceSince) facts.push(['In force since', `${dayWithYear(mask.inForceSince)}${mask.inForceBy ? `, by ${mask.inForceBy}` : ''}`])
  if (mask.note) facts.push(['Mind', mask.note])
  return (
    <Facts>
      {facts.map(([name, value]) => (
        <Fact key={name} name={name}>
          {value}
        </Fact>
      ))}
    </Facts>
  )
}
