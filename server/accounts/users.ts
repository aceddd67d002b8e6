import type { z } from 'zod'
import type { newUser, User } from '../../shared/schemas/users'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { peopleAfter, personById, rolesOf, setRoles, type PersonRow } from '../queries/people'
import { audit } from './audit'
import { hashPassword } from './passwords'
import type { Person } from './person'

export async function listUsers(context: Context, afterId: number, limit: number): Promise<User[]> {
  return (await peopleAfter(context.db, afterId, limit)).map(presentUser)
}

export async function createUser(context: Context, person: Person, wanted: z.output<typeof newUser>): Promise<User> {
  const { roles, password, ...fields } = wanted
  const passwordHash = await hashPassword(context, password)
  const id = await context.db.write(async (tx) => {
    const taken = await context.models.users.findOne({ where: { email: fields.email }, transaction: tx })
    if (taken) throw new ApiError('conflict', 'Somebody with this e-mail address has an account already.', { userId: taken.id })
    const user = await context.models.users.create(
      { ...fields, passwordHash, disabled: false, createdAt: context.clock.now() },
      { transaction: tx },
    )
    await setRoles(context.db, user.id, roles, tx)
    await audit(context, tx, { userId: person.id, action: 'user:create', subject: `user ${user.id}`, details: { email: fields.email, roles } })
    return user.id
  })
  return userById(context, id)
}

export async function userById(context: Context, id: number): Promise<User> {
  const row = await personById(context.db, id)
  if (!row) throw new ApiError('not-found', 'There is no such person.')
  return presentUser(row)
}

function presentUser(row: PersonRow): User {
  return {
    id: row.id,
    email: row.email,
    name: row.name,
    roles: rolesOf(row),
    timeZone: row.timeZone,
    phone: row.phone,
    disabled: row.disabled === 1,
    createdAt: new Date(row.createdAt).toISOString(),
    lastSeenAt: row.lastSeenAt === null ? null : new Date(row.lastSeenAt).toISOString(),
    version: row.version,
  }
}
