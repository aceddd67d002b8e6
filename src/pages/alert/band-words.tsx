import { useQuery } from '@tanstack/react-query'
import { baselineStatistics } from '../../../shared/schemas/series'
import type { Alert } from '../../../shared/schemas/alerts'
import { baselineQuery } from '../../api/series'
import { addDays, daySpan } from '../../lib/dates'
import { yearsWords } from '../../lib/years-words'

/** Which days of which years the usual band was made from; the days only while that very baseline is in force. */
export function BandWords({ alert }: { alert: Alert }) {
  const { regionId, feedId, evidence } = alert
  const statistic = baselineStatistics.find((name) => name === evidence.statistic)
  const { data } = useQuery(baselineQuery({ regionId, feedId, statistic }))
  const same = data && data.version === evidence.baselineVersion
  const days = same ? ` of ${daySpan(addDays(evidence.day, -data.halfWidthDays), addDays(evidence.day, data.halfWidthDays))}` : ' at this time of year'
  return <>Band: tenth to ninetieth percentile{days} in {yearsWords(evidence.baselineYears)}.</>
}
