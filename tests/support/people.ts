import type { Agent } from 'supertest'
import { roles as allRoles, type Role } from '../../shared/permissions'
import { hashPassword } from '../../server/accounts/passwords'
import { issueToken } from '../../server/accounts/tokens'
import type { Context } from '../../server/context'
import { setRoles } from '../../server/queries/people'

export interface TestUser {
  id: number
  email: string
  name: string
  password: string
  roles: Role[]
}

let count = 0

export interface UserWish {
  roles?: Role[]
  email?: string
  name?: string
  password?: string
  timeZone?: string
}

/** Somebody with an account; with every role but admin, unless others are asked for. */
export async function aUser(context: Context, wish: UserWish = {}): Promise<TestUser> {
  count += 1
  const { roles = allRoles.filter((role) => role !== 'admin'), name = `Person ${count}`, password = 'sea-slate-and-paper' } = wish
  const email = wish.email ?? `person${count}@example.org`
  const passwordHash = await hashPassword(context, password)
  const id = await context.db.write(async (tx) => {
    const user = await context.models.users.create(
      { email, name, passwordHash, timeZone: wish.timeZone ?? 'UTC', disabled: false, createdAt: context.clock.now() },
      { transaction: tx },
    )
    await setRoles(context.db, user.id, roles, tx)
    return user.id
  })
  return { id, email, name, password, roles: [...roles] }
}

/** Signs in over HTTP; the agent keeps the cookies. */
export async function signIn(agent: Agent, user: { email: string; password: string }): Promise<void> {
  await agent.post('/api/auth/sign-in').send({ email: user.email, password: user.password }).expect(200)
}

/** The value of an Authorization header. */
export async function bearer(context: Context, user: { id: number }): Promise<string> {
  const { token } = await issueToken(context, user.id, { name: 'test', expiresInDays: null })
  return `Bearer ${token}`
}
