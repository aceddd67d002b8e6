import type { Context } from '../context'
import type { Transaction } from '../db'
import type { FeedRow } from '../models/feed'
import { sourceLayersBeside } from '../queries/derived-layers'
import { deriveLayers } from './derive-layers'
import { summariseLayers } from './summarise-layers'

const layersAtOnce = 62

/** What a derived feed got out of a file. */
export interface DerivedShare {
  feed: FeedRow
  layers: number
}

/** The derived feeds that live on the layers just read: their own layers, and every region's figures of them. */
export async function deriveFrom(
  context: Context,
  read: { layerIds: readonly number[]; feedIds: readonly number[] },
  alongside: (tx: Transaction) => Promise<void>,
): Promise<DerivedShare[]> {
  const shares: DerivedShare[] = []
  for (const feed of await context.models.feeds.findAll({ where: { retired: false }, order: [['id', 'ASC']] })) {
    const { derivedFrom, derivedSources } = feed
    if (derivedFrom === null || !read.feedIds.some((id) => derivedSources.includes(id))) continue
    const sources = await sourceLayersBeside(context, { derivedFrom, derivedSources }, read.layerIds)
    let layers = 0
    for (let from = 0; from < sources.length; from += layersAtOnce) {
      const layerIds = await deriveLayers(context, feed, sources.slice(from, from + layersAtOnce))
      layers += layerIds.length
      await summariseLayers(context, feed.id, layerIds, alongside)
    }
    if (layers > 0) shares.push({ feed, layers })
  }
  return shares
}
