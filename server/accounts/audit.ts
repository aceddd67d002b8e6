import type { Context } from '../context'
import type { Transaction } from '../db'

export interface AuditNote {
  /** Null where nobody is signed in: the system itself, or somebody who failed to sign in. */
  userId: number | null
  /** Noun and verb, such as `user:disable`. */
  action: string
  /** What it was done to, such as `user 12`. */
  subject: string
  details?: Record<string, unknown>
}

/** Writes who did what, in the transaction that does it. Details never hold passwords, tokens or links. */
export async function audit(context: Context, tx: Transaction, { userId, action, subject, details = {} }: AuditNote): Promise<void> {
  await context.models.audit.create({ at: context.clock.now(), userId, action, subject, details }, { transaction: tx })
}
