import type { Database, Transaction } from '../db'

/** Jobs that are done and were last touched before an instant. Those that failed or were cancelled stay to be looked at. */
export async function removeDoneJobs(db: Database, tx: Transaction, before: number): Promise<void> {
  await db.run(`DELETE FROM jobs WHERE state = 'done' AND updated_at < $before`, { before }, tx)
}

/** What is remembered of addresses that no pull of their feed has asked for since its look-back, and some days more. */
export async function removeOldAddresses(db: Database, tx: Transaction, { now, spareDays }: { now: number; spareDays: number }): Promise<void> {
  await db.run(
    `DELETE FROM pulled_addresses WHERE asked_at < $now - 86400000 * ($spareDays + ifnull((SELECT look_back_days FROM feed_pulls p WHERE p.feed_id = pulled_addresses.feed_id), 0))`,
    { now, spareDays },
    tx,
  )
}
