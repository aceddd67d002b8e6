import type { Feed } from '../../shared/schemas/feeds'

/** What a feed measures, in a word to stand in front of a unit. */
export function quantityWord(feed: Pick<Feed, 'quantity' | 'variable'>): string {
  if (feed.quantity === 'chlorophyll') return 'Chlorophyll'
  return feed.quantity === 'reflectance' ? `Reflectance ${feed.variable}` : feed.variable
}
