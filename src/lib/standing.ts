import type { RegionStanding } from '../../shared/schemas/regions'
import { timesUsual } from './format'

/** A region's standing in a word or two: "3.4 times usual", "not seen". */
export function standingWord({ state, view }: RegionStanding): string {
  return state === 'unusual' && view?.timesUsual != null ? `${timesUsual(view.timesUsual)} times usual` : state
}
