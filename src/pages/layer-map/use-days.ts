import { useQuery, keepPreviousData } from '@tanstack/react-query'
import type { FeedDays } from '../../../shared/schemas/layers'
import { feedDaysQuery } from '../../api/layers'
import { addDays } from '../../lib/dates'
import { daysAround } from './slider-days'

/** Beyond the two months on the slider, so that the layers next to it are known when it turns over. */
const aroundDays = 62

export interface Days {
  first: string | null
  last: string | null
  layersOf: ReadonlyMap<string, FeedDays['days'][number]['layers']>
  /** The nearest days with a layer before and after. */
  before: string | undefined
  after: string | undefined
}

/** Which days around one have layers of a feed. */
export function useDays(feedId: number | undefined, day: string | undefined): { days: Days | undefined; error: Error | null; retry: () => void } {
  const shown = daysAround(day ?? '1970-01-01', 2)
  const query = useQuery({
    ...feedDaysQuery(feedId ?? 0, addDays(shown[0] ?? '1970-01-01', -aroundDays), addDays(shown.at(-1) ?? '1970-01-01', aroundDays)),
    enabled: feedId !== undefined && day !== undefined,
    placeholderData: keepPreviousData,
  })
  const data = query.data?.feedId === feedId ? query.data : undefined
  const days = data && {
    first: data.first,
    last: data.last,
    layersOf: new Map(data.days.map((one) => [one.day, one.layers])),
    before: data.days.findLast((one) => day !== undefined && one.day < day)?.day,
    after: data.days.find((one) => day !== undefined && one.day > day)?.day,
  }
  return { days, error: query.error, retry: () => void query.refetch() }
}
