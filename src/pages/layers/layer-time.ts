import type { Layer } from '../../../shared/schemas/layers'
import { clockTime, dayWithYear } from '../../lib/dates'

/** When a layer was observed, in UTC: a layer with a date only shows no clock time, a composite its days. */
export function layerTime({ observedAt, endsAt, hasClock }: Pick<Layer, 'observedAt' | 'endsAt' | 'hasClock'>): string {
  const start = dayWithYear(observedAt.slice(0, 10))
  if (endsAt) return `${start} to ${dayWithYear(endsAt.slice(0, 10))}`
  return hasClock ? `${start} ${clockTime(observedAt, 'UTC')}` : start
}
