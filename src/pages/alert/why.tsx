import { useQuery } from '@tanstack/react-query'
import type { Alert } from '../../../shared/schemas/alerts'
import { explanationQuery } from '../../api/alerts'
import { Failure } from '../../components/ui/failure'
import { FaultMark } from '../../components/ui/fault-mark'
import { Figure } from '../../components/ui/figure'
import { unitWords } from '../../../shared/figure-text'
import { countWords, figure, percent, timesUsual } from '../../lib/format'
import { Sources } from './sources'
import { BandWords } from './band-words'
import { statisticName } from './statistic-name'
import { WhyRule } from './why-rule'

/** Every figure the alert rests on, on one scale, with where each came from. */
export function Why({ alert }: { alert: Alert }) {
  const { evidence } = alert
  const unit = unitWords(evidence.unit)
  const band = evidence.p10 !== null && evidence.p90 !== null
  return (
    <section id="why" aria-label="Why it fired" className="grid scroll-mt-4 gap-4">
      <div className="flex flex-wrap items-baseline justify-between gap-x-4">
        <h2 className="text-lead">Why it fired</h2>
        <Recomputed alertId={alert.id} />
      </div>
      <div className="grid gap-x-12 gap-y-6 desk:grid-cols-[minmax(0,1.9fr)_minmax(0,1fr)]">
        <div className="grid content-start gap-4">
          <div className="grid grid-cols-2 gap-x-6 gap-y-4 tab:flex tab:justify-between">
            {evidence.timesUsual !== null && <Figure ember label="Times usual" value={timesUsual(evidence.timesUsual)} note={`${statisticName(evidence.statistic)} over its usual`} />}
            <Figure label="Value" value={figure(evidence.value)} note={`${unit}${unit ? ', ' : ''}${statisticName(evidence.statistic)}`} />
            <Figure label="Usual" value={figure(evidence.usual)} note={band && `${figure(evidence.p10)} to ${figure(evidence.p90)}, p10 to p90`} />
            <Figure
              label="Coverage"
              value={percent(evidence.coverage).replace(' %', '')}
              unit="%"
              note={`floor ${percent(evidence.coverageFloor)}, ${countWords(evidence.wholeValid, 'whole cell')}`}
            />
          </div>
          <WhyRule evidence={evidence} />
          <p className="text-small text-ink2">
            {unit ? `${unit}, logarithmic. ` : 'Logarithmic. '}
            {band && <BandWords alert={alert} />}
          </p>
        </div>
        <Sources evidence={evidence} />
      </div>
    </section>
  )
}

/** The figures are computed again from the stored layers while the person reads. */
function Recomputed({ alertId }: { alertId: number }) {
  const { data, error, refetch } = useQuery(explanationQuery(alertId))
  if (error) return <Failure error={error} onRetry={() => void refetch()} />
  if (!data) return <p className="text-small text-ink2">computing it again from the stored layers</p>
  if (data.agrees) return <p className="text-small text-ink2">recomputed from the stored layers: agrees</p>
  return (
    <div className="flex items-start gap-2 text-small">
      <FaultMark />
      <div>
        <b className="font-heading">does not agree.</b> {data.sentence}
        {data.differences.length > 0 && (
          <ul>
            {data.differences.map((difference) => (
              <li key={difference}>{difference}</li>
            ))}
          </ul>
        )}
      </div>
    </div>
  )
}
