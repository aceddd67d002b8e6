import type { z } from 'zod'
import { can } from '../../shared/permissions'
import type { newSubscription, Subscription, subscriptionChange } from '../../shared/schemas/duty'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import * as queries from '../queries/subscriptions'
import { audit } from './audit'
import type { Person } from './person'

/** Everybody's for an admin, one's own for anybody else. */
export async function listSubscriptions(context: Context, person: Person, afterId: number, limit: number): Promise<Subscription[]> {
  const userId = can(person, 'subscription:any') ? null : person.id
  return (await queries.subscriptionsAfter(context.db, userId, afterId, limit)).map(present)
}

export async function subscribe(context: Context, person: Person, wanted: z.output<typeof newSubscription>): Promise<Subscription> {
  const { userId = person.id, regionIds, pausedUntil, ...fields } = wanted
  if (userId !== person.id && !can(person, 'subscription:any')) {
    throw new ApiError('not-allowed', "Somebody else's subscription needs an admin.")
  }
  return context.db.write(async (tx) => {
    if (!(await context.models.users.findByPk(userId, { transaction: tx }))) {
      throw new ApiError('not-valid', 'There is no such person.', { fields: { userId: 'There is no such person.' } })
    }
    await checkRegions(context, tx, fields.allRegions, regionIds)
    const { id } = await context.models.subscriptions.create({ ...fields, userId, pausedUntil: epoch(pausedUntil) }, { transaction: tx })
    await queries.setSubscriptionRegions(context.db, id, regionIds, tx)
    await audit(context, tx, { userId: person.id, action: 'subscription:create', subject: `subscription ${id}`, details: { ...fields, userId, regionIds } })
    return readBack(context, tx, id)
  })
}

export async function changeSubscription(
  context: Context,
  person: Person,
  id: number,
  { version, regionIds, pausedUntil, ...fields }: z.output<typeof subscriptionChange>,
): Promise<Subscription> {
  return context.db.write(async (tx) => {
    const subscription = await ownOrAny(context, tx, person, id)
    if (subscription.version !== version) {
      throw new ApiError('stale-version', 'This subscription was changed in the meantime. Look again.', { version: subscription.version })
    }
    const before = await readBack(context, tx, id)
    await checkRegions(context, tx, fields.allRegions ?? before.allRegions, regionIds ?? before.regionIds)
    const given = Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined))
    const pause = pausedUntil === undefined ? {} : { pausedUntil: epoch(pausedUntil) }
    await subscription.update({ ...given, ...pause, version: version + 1 }, { transaction: tx })
    if (regionIds) await queries.setSubscriptionRegions(context.db, id, regionIds, tx)
    const details = { ...given, ...(regionIds ? { regionIds } : {}), ...(pausedUntil === undefined ? {} : { pausedUntil }) }
    await audit(context, tx, { userId: person.id, action: 'subscription:change', subject: `subscription ${id}`, details })
    return readBack(context, tx, id)
  })
}

export async function unsubscribe(context: Context, person: Person, id: number): Promise<void> {
  await context.db.write(async (tx) => {
    const subscription = await ownOrAny(context, tx, person, id)
    await subscription.destroy({ transaction: tx })
    await audit(context, tx, { userId: person.id, action: 'subscription:end', subject: `subscription ${id}`, details: { userId: subscription.userId } })
  })
}

async function ownOrAny(context: Context, tx: Transaction, person: Person, id: number) {
  const subscription = await context.models.subscriptions.findByPk(id, { transaction: tx })
  if (!subscription) throw new ApiError('not-found', 'There is no such subscription.')
  if (subscription.userId !== person.id && !can(person, 'subscription:any')) {
    throw new ApiError('not-allowed', "Somebody else's subscription needs an admin.")
  }
  return subscription
}

async function checkRegions(context: Context, tx: Transaction, allRegions: boolean, regionIds: number[]): Promise<void> {
  const unknown = await queries.unknownRegions(context.db, regionIds, tx)
  const message = unknown.length > 0 ? `There is no region ${unknown.join(', ')}.` : 'Choose at least one region, or all of them.'
  if (unknown.length > 0 || (!allRegions && regionIds.length === 0)) throw new ApiError('not-valid', message, { fields: { regionIds: message } })
}

async function readBack(context: Context, tx: Transaction, id: number): Promise<Subscription> {
  const row = await queries.subscriptionById(context.db, id, tx)
  if (!row) throw new ApiError('not-found', 'There is no such subscription.')
  return present(row)
}

function present({ allRegions, regionIds, pausedUntil, ...row }: queries.SubscriptionListRow): Subscription {
  return {
    ...row,
    allRegions: allRegions === 1,
    regionIds: JSON.parse(regionIds) as number[],
    pausedUntil: pausedUntil === null ? null : new Date(pausedUntil).toISOString(),
  }
}

const epoch = (instant: string | null): number | null => (instant === null ? null : Date.parse(instant))
