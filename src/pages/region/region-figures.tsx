import type { RegionStanding } from '../../../shared/schemas/regions'
import { Figure } from '../../components/ui/figure'
import { unitWords } from '../../../shared/figure-text'
import { figure, percent, threeDigits, timesUsual } from '../../lib/format'

/** What the state rests on. A figure that is missing is left out, never written as 0. */
export function RegionFigures({ standing }: { standing: RegionStanding }) {
  const { view, unit, state, coverageFloor } = standing
  if (!view) return null
  const band = view.p10 !== null && view.p90 !== null ? `${threeDigits(view.p10)} to ${threeDigits(view.p90)}, p10 to p90` : undefined
  return (
    <div className="grid grid-cols-2 gap-x-6 gap-y-4 border-y border-ink py-4 tab:grid-cols-4">
      {view.timesUsual !== null && (
        <Figure label="Times usual" value={timesUsual(view.timesUsual)} note="of the newest usable view" ember={state === 'unusual'} />
      )}
      <Figure label="Value" value={figure(view.value)} unit={unitWords(unit)} />
      <Figure label="Usual" value={figure(view.usual)} unit={unitWords(unit)} note={band} />
      <Figure label="Coverage" value={percent(view.coverage)} note={`floor ${percent(coverageFloor)}`} />
    </div>
  )
}
