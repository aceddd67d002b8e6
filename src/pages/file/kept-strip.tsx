import { keptAndMasked, reasonMissing } from '../../../shared/science/kept-and-masked'
import type { FoundCells } from '../../../shared/schemas/found'
import { SectionHead } from '../../components/ui/page'
import { countWords, grouped, percent } from '../../lib/format'

interface Props {
  found: FoundCells
  hiddenFlags: readonly string[]
  /** All cells of the grid. */
  gridCells: number
}

/** Each reason has a hatch angle of its own; the one of missing is that of every map. */
const angles = [21, 69, 159, 90, 0, 45, 135]
const hatch = (angle: number) => ({ backgroundImage: `repeating-linear-gradient(${angle}deg, var(--ink3) 0 1px, transparent 1px 5px)` })

/** Which share of the cells would be kept, and what hides the others: one bar of 100 %, and every reason in words. */
export function KeptStrip({ found, hiddenFlags, gridCells }: Props) {
  const { cells, kept, parts, unlisted } = keptAndMasked(found, hiddenFlags)
  if (cells === 0) return null
  const share = (part: number) => percent(part / cells)
  const looked = cells < gridCells ? `first step, ${grouped(cells)} of ${grouped(gridCells)} cells` : `first step, ${countWords(cells, 'cell')}`
  const plain = parts.length === 1 && parts[0]?.reason === reasonMissing
  const shown = parts.map((part, i) => ({ ...part, style: part.reason === reasonMissing ? { backgroundImage: 'var(--hatch-fine)' } : hatch(angles[i % angles.length]!) }))
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-2">
      <SectionHead ruled={false} aside={<span className="fig">{looked}</span>}>
        Kept and masked, by reason
      </SectionHead>
      <div aria-hidden className="flex h-7 border border-ink">
        <span className="bg-ink2" style={{ width: `${(kept / cells) * 100}%` }} />
        {shown.map((part) => (
          <span key={part.reason} className="border-l border-ink first:border-l-0" style={{ width: `${(part.first / cells) * 100}%`, ...part.style }} />
        ))}
      </div>
      <ul className="flex flex-wrap gap-x-7 gap-y-1.5 text-small" aria-live="polite">
        <li className="flex items-center gap-2">
          <span aria-hidden className="inline-block h-3 w-6 border border-ink bg-ink2" />
          <b className="font-heading">kept</b> <span className="fig">{share(kept)}</span>
        </li>
        {shown.map((part) => (
          <li key={part.reason} className="flex items-center gap-2">
            <span aria-hidden className="inline-block h-3 w-6 border border-ink" style={part.style} />
            <span>masked: {wordsOf(part.reason, plain)}</span> <span className="fig">{share(part.cells)}</span>
          </li>
        ))}
        {unlisted > 0 && (
          <li>
            rare mixtures of flags, not told apart <span className="fig">{share(unlisted)}</span>
          </li>
        )}
      </ul>
      {parts.length > 1 && <p className="text-fine text-ink3">A cell may have several reasons: the words count it under each, the bar under the first.</p>}
    </section>
  )
}

function wordsOf(reason: string, plain: boolean): string {
  return reason === reasonMissing && !plain ? `${reason}, no reason given` : reason
}
