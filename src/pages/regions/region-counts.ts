import { regionStates, type RegionStateName } from '../../../shared/schemas/common'
import type { Region } from '../../../shared/schemas/regions'
import { countWords } from '../../lib/format'

interface Counts {
  worry: string | undefined
  rest: string
  detail: string | undefined
}

/** The sentence at the head of the list, counted from its rows. */
export function regionCounts(regions: readonly Region[]): Counts {
  const counts = new Map<RegionStateName, number>()
  for (const { standing } of regions) counts.set(standing.state, (counts.get(standing.state) ?? 0) + 1)
  const unusual = counts.get('unusual') ?? 0
  const others = regionStates.filter((state) => state !== 'unusual' && counts.has(state))
  const detail = others.map((state) => `${counts.get(state)} ${state}`).join(', ')
  if (regions.length === 0) return { worry: undefined, rest: 'Regions', detail: undefined }
  const watched = `${countWords(regions.length, 'region')} watched.`
  if (unusual === 0) return { worry: undefined, rest: watched, detail: detail || undefined }
  return { worry: `${unusual} of ${regions.length} unusual.`, rest: watched, detail: detail && `Besides these: ${detail}.` }
}
