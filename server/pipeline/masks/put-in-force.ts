import { audit } from '../../accounts/audit'
import type { Person } from '../../accounts/person'
import { ApiError } from '../../api-error'
import type { Context } from '../../context'
import { maskById } from '../../queries/masks'
import { queueFeedBackfill } from '../backfill-feed'
import { maskInForce, maskText } from './mask-in-force'

/**
 * Puts a mask in force, a later or an earlier one: the history of its feed is made anew by it and judged again. Answers
 * the feed's id. `insteadOf` is what the person saw in force when they decided.
 */
export async function putInForce(context: Context, person: Person, id: number, { insteadOf }: { insteadOf: number }): Promise<number> {
  const feedId = await context.db.write(async (tx) => {
    const mask = await maskById(context, id, tx)
    const feed = mask && (await context.models.feeds.findByPk(mask.feedId, { transaction: tx }))
    if (!mask || !feed) throw new ApiError('not-found', 'There is no such water mask.')
    if (feed.retired) throw new ApiError('conflict', `${feed.name} is retired: its figures stay as they are.`)
    const now = await maskInForce(context, feed.id, mask.gridId, tx)
    if (now.id === id) throw new ApiError('conflict', 'This water mask is in force already.')
    if (now.id !== insteadOf) throw new ApiError('stale-version', 'Somebody else put another water mask in force meanwhile. Look at it again.', { inForce: now.id })
    await context.db.run(
      `INSERT INTO masks_in_force (feed_id, grid_id, mask_id, since, by) VALUES ($feedId, $gridId, $id, $at, $by)
       ON CONFLICT (feed_id, grid_id) DO UPDATE SET mask_id = excluded.mask_id, since = excluded.since, by = excluded.by`,
      { feedId: feed.id, gridId: mask.gridId, id, at: context.clock.now(), by: person.id },
      tx,
    )
    await queueFeedBackfill(context, tx, feed)
    const before = await maskById(context, now.id, tx)
    const details = { mask: maskText(mask), insteadOf: before ? maskText(before) : null, grid: mask.gridId, checksum: mask.checksum }
    await audit(context, tx, { userId: person.id, action: 'mask:in-force', subject: `feed ${feed.id}`, details })
    return feed.id
  })
  context.news.tell({ topic: 'feeds', id: feedId }, { topic: 'jobs' })
  context.wake()
  return feedId
}
