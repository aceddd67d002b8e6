import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { changeFeed, createFeed, presentFeeds } from '../pipeline/feeds'
import { feedDays } from '../queries/feed-days'
import { rowsAfter } from '../queries/rows-after'
import { cursorId, pageOf } from './paging'
import { serve } from './serve'

export function feedRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.listFeeds, async ({ query: { limit, cursor } }) => {
    const { items, nextCursor } = pageOf(await rowsAfter(context.models.feeds, cursorId(cursor, 0), limit + 1), limit)
    return { items: await presentFeeds(context, items), nextCursor }
  })
  serve(router, context, endpoints.createFeed, async ({ person, body }) => (await presentFeeds(context, [await createFeed(context, person, body)]))[0]!)
  serve(router, context, endpoints.feed, async ({ params }) => {
    const feed = await context.models.feeds.findByPk(params.id)
    if (!feed) throw new ApiError('not-found', 'There is no such feed.')
    return (await presentFeeds(context, [feed]))[0]!
  })
  serve(router, context, endpoints.feedDays, async ({ params, query }) => {
    if ((await context.models.feeds.count({ where: { id: params.id } })) === 0) throw new ApiError('not-found', 'There is no such feed.')
    return feedDays(context, params.id, query)
  })
  serve(router, context, endpoints.changeFeed, async ({ person, params, body }) => (await presentFeeds(context, [await changeFeed(context, person, params.id, body)]))[0]!)
}
