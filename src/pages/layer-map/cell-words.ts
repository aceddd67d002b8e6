import type { LayerPoint, UsualHere } from '../../../shared/schemas/layers'
import { dayWords } from '../../lib/dates'
import { countWords } from '../../lib/format'

const half = { latitude: ['N', 'S'], longitude: ['E', 'W'] } as const

/** "51.3958° N": a cell of a few hundred metres needs four digits. */
function degreesText(value: number, axis: 'latitude' | 'longitude'): string {
  const turned = axis === 'longitude' ? ((((value + 180) % 360) + 360) % 360) - 180 : value
  return `${Math.abs(turned).toFixed(4)}° ${half[axis][turned < 0 ? 1 : 0]}`
}

export function cellMiddle({ cell }: Pick<LayerPoint, 'cell'>): string {
  return cell ? `${degreesText(cell.latitude, 'latitude')}, ${degreesText(cell.longitude, 'longitude')}` : 'not known'
}

/** The box round a cell, which for cells of a plain grid is the cell itself. */
export function cellBounds({ cell }: Pick<LayerPoint, 'cell'>): string {
  if (!cell) return 'not known'
  const lons = cell.corners.map(([lon]) => lon)
  const lats = cell.corners.map(([, lat]) => lat)
  const span = (values: number[], axis: 'latitude' | 'longitude') => `${degreesText(Math.min(...values), axis)} to ${degreesText(Math.max(...values), axis)}`
  return `${span(lats, 'latitude')}, ${span(lons, 'longitude')}`
}

/** How the usual value came about, or why there is none. */
export function usualWords({ values, years, yearsWithLayers, halfWidthDays, cut }: UsualHere, day: string): string {
  const when = `${halfWidthDays} days either side of ${dayWords(day)}`
  if (yearsWithLayers === 0) return `The feed has no layers ${when} in earlier years, of this processing version.`
  if (values === 0) return `This cell was missing ${when} in ${countWords(yearsWithLayers, 'earlier year')}.`
  const left = cut ? '; years before these were not read' : ''
  return `median of ${countWords(values, 'value')} from ${countWords(years, 'earlier year')}, ${when}${left}`
}

/** A screen's 1 and 0 in words; between them views are of two minds. */
export function yesOrNo(value: number | null): string {
  return value === null ? '' : value > 0.5 ? 'yes' : value < 0.5 ? 'no' : 'as often yes as no'
}
