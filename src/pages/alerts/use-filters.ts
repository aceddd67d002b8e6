import { useSearchParams } from 'react-router-dom'
import { alertStates } from '../../../shared/schemas/alerts'
import { severities } from '../../../shared/schemas/common'
import type { AlertFilter } from '../../api/alerts'

/** The filters live in the address: a list can be sent to a colleague, and "back" goes back. */
export function useFilters(): [filter: AlertFilter, change: (filter: AlertFilter) => void] {
  const [search, setSearch] = useSearchParams()
  const regionId = Number(search.get('region'))
  const filter: AlertFilter = {
    state: alertStates.find((state) => state === search.get('state')),
    severity: severities.find((severity) => severity === search.get('severity')),
    regionId: regionId > 0 ? regionId : undefined,
  }
  const change = (next: AlertFilter) => {
    const given: [string, string | number | undefined][] = [
      ['state', next.state],
      ['severity', next.severity],
      ['region', next.regionId],
    ]
    setSearch(given.flatMap(([name, value]): [string, string][] => (value === undefined ? [] : [[name, String(value)]])))
  }
  return [filter, change]
}
