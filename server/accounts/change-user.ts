import type { z } from 'zod'
import type { User, userChange } from '../../shared/schemas/users'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import { enabledAdmins, setRoles } from '../queries/people'
import { audit } from './audit'
import type { Person } from './person'
import { revokeAllSessions } from './sessions'
import { userById } from './users'

type UserChange = z.output<typeof userChange>

/** Changes a person; a role taken away or a disabled account acts with the next call. One enabled admin always stays. */
export async function changeUser(context: Context, person: Person, id: number, change: UserChange): Promise<User> {
  const { version, roles, ...fields } = change
  await context.db.write(async (tx) => {
    const user = await context.models.users.findByPk(id, { transaction: tx })
    if (!user) throw new ApiError('not-found', 'There is no such person.')
    if (user.version !== version) {
      throw new ApiError('stale-version', 'Somebody else changed this person in the meantime. Look again.', { version: user.version })
    }
    const given = Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined))
    await user.update({ ...given, version: version + 1 }, { transaction: tx })
    if (roles) await setRoles(context.db, id, roles, tx)
    await keepOneAdmin(context, tx)
    if (fields.disabled) await revokeAllSessions(context, tx, id)
    const details = { ...given, ...(roles ? { roles } : {}) }
    await audit(context, tx, { userId: person.id, action: 'user:change', subject: `user ${id}`, details })
  })
  return userById(context, id)
}

async function keepOneAdmin(context: Context, tx: Transaction): Promise<void> {
  if ((await enabledAdmins(context.db, tx)).length === 0) {
    throw new ApiError('conflict', 'Offing needs at least one admin who can sign in. Make somebody else an admin first.')
  }
}
