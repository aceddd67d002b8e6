import { useInfiniteQuery, useQuery } from '@tanstack/react-query'
import { feedsQuery } from '../../api/feeds'
import { layersQuery } from '../../api/layers'
import { regionsQuery } from '../../api/regions'
import { boundsAround } from '../map/bounds'
import type { OutlinedRegion } from '../map/region-outlines'
import type { MapBounds } from '../map/sea-map'

const wholeSea: MapBounds = [
  [-60, -170],
  [72, 170],
]

/** What the map of a drawing shows at first: the newest layer of the feed, and the regions there are. */
export function useDrawingGround(feedId: number | undefined, leaveOut: number | undefined) {
  const regions = useQuery(regionsQuery())
  const feeds = useQuery(feedsQuery())
  const feed = feedId ?? feeds.data?.items.find((one) => one.quantity === 'chlorophyll' && !one.retired)?.id
  const layers = useInfiniteQuery({ ...layersQuery({ feedId: feed }), enabled: feed !== undefined })
  const newest = layers.data?.pages[0]?.items[0]
  const watched = regions.data?.items.filter((region) => !region.retired && region.id !== leaveOut) ?? []
  const others: OutlinedRegion[] = watched.map(({ id, name, geometry }) => ({ id, name, geometry, state: 'usual' }))
  const grid: MapBounds | undefined = newest && [
    [Math.max(-84, newest.grid.south), newest.grid.west],
    [Math.min(84, newest.grid.north), newest.grid.east],
  ]
  return {
    others,
    layerId: newest?.id,
    bounds: boundsAround(others.map((other) => other.geometry), 0.15) ?? grid ?? wholeSea,
    ready: !regions.isPending && !feeds.isPending && (feed === undefined || !layers.isPending),
    feeds: feeds.data?.items.filter((one) => !one.retired) ?? [],
  }
}
