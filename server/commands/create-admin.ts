import { z } from 'zod'
import { email, password } from '../../shared/schemas/users'
import { audit } from '../accounts/audit'
import { hashPassword } from '../accounts/passwords'
import { revokeAllSessions } from '../accounts/sessions'
import type { Context } from '../context'
import { personById, rolesOf, setRoles } from '../queries/people'

const admin = z.object({ email, password })

/** Makes an admin; somebody already there gets the role and the new password, and is enabled. Throws a sentence if not valid. */
export async function createAdmin(context: Context, given: { email: string; password: string }): Promise<{ id: number; created: boolean }> {
  const parsed = admin.safeParse(given)
  if (!parsed.success) throw new Error(parsed.error.issues.map((issue) => issue.message).join(' '))
  const passwordHash = await hashPassword(context, parsed.data.password)
  return context.db.write(async (tx) => {
    const known = await context.models.users.findOne({ where: { email: parsed.data.email }, transaction: tx })
    const user =
      known ??
      (await context.models.users.create(
        {
          email: parsed.data.email,
          name: parsed.data.email.split('@')[0] ?? parsed.data.email,
          passwordHash,
          timeZone: 'UTC',
          disabled: false,
          createdAt: context.clock.now(),
        },
        { transaction: tx },
      ))
    if (known) {
      await known.update({ passwordHash, disabled: false, version: known.version + 1 }, { transaction: tx })
      await revokeAllSessions(context, tx, known.id)
    }
    const row = await personById(context.db, user.id, tx)
    await setRoles(context.db, user.id, [...new Set([...(row ? rolesOf(row) : []), 'admin' as const])], tx)
    await audit(context, tx, { userId: null, action: 'user:make-admin', subject: `user ${user.id}`, details: { byCommand: true } })
    return { id: user.id, created: !known }
  })
}
