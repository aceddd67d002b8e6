import { regionStates, type RegionStateName } from '../../../shared/schemas/common'
import type { Region } from '../../../shared/schemas/regions'
import { countAtHead } from '../../lib/format'

interface Counts {
  worry: string | undefined
  rest: string | undefined
  detail: string | undefined
}

/** The sentence at the head of the list, counted from its rows. */
export function regionCounts(regions: readonly Region[]): Counts {
  if (regions.length === 0) return { worry: undefined, rest: 'Regions', detail: undefined }
  const counts = new Map<RegionStateName, number>()
  for (const { standing } of regions) counts.set(standing.state, (counts.get(standing.state) ?? 0) + 1)
  const unusual = counts.get('unusual') ?? 0
  const others = regionStates.filter((state) => state !== 'unusual' && counts.has(state))
  const detail = others.length > 0 ? sentence(others.map((state) => `${inWords(counts.get(state) ?? 0)} ${state}`)) : undefined
  const all = `${inWords(regions.length)} ${regions.length === 1 ? 'region' : 'regions'}`
  if (unusual > 0) return { worry: `${countAtHead(unusual)} of ${all} ${unusual === 1 ? 'is' : 'are'} unusual.`, rest: undefined, detail }
  return { worry: undefined, rest: `${countAtHead(regions.length)} ${regions.length === 1 ? 'region is' : 'regions are'} watched; none is unusual.`, detail }
}

function inWords(count: number): string {
  return countAtHead(count).toLowerCase()
}

function sentence(parts: string[]): string {
  const text = parts.join(', ')
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`
}
