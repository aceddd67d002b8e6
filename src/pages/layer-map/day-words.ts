import type { FeedDays } from '../../../shared/schemas/layers'
import { clockTime, daySpan } from '../../lib/dates'

type DayLayer = FeedDays['days'][number]['layers'][number]

/** "layer of 13:12 UTC", "2 layers", "no layer". */
export function dayWords(layers: readonly DayLayer[] | undefined): string {
  const [first, ...others] = layers ?? []
  if (!first) return 'no layer'
  const suspect = layers?.every((one) => one.suspect) ? ', marked suspect' : ''
  if (others.length > 0) return `${others.length + 1} layers${suspect}`
  return `${timeWords(first)}${suspect}`
}

function timeWords({ observedAt, endsAt, hasClock }: DayLayer): string {
  if (endsAt) return `composite of ${daySpan(observedAt, new Date(Date.parse(endsAt) - 1).toISOString())}`
  return hasClock ? `layer of ${clockTime(observedAt, 'UTC')} UTC` : 'one layer, no clock time'
}

/** The layer shown when nobody chose among those of a day: the last that nobody doubts. */
export function layerOfDay(layers: readonly DayLayer[] | undefined, chosen: number | undefined): DayLayer | undefined {
  return layers?.find((one) => one.id === chosen) ?? layers?.findLast((one) => !one.suspect) ?? layers?.at(-1)
}
