import type { Me } from '../../shared/schemas/auth'
import type { Context } from '../context'
import { personById, rolesOf } from '../queries/people'
import type { Person } from './person'
import type { SessionTokens } from './sessions'

export function presentMe(context: Context, person: Omit<Person, 'by'>): Me {
  const { id, email, name, roles, timeZone } = person
  return { id, email, name, roles, timeZone, demo: context.env.mode === 'demo', mailPage: context.mailCatcher !== null }
}

/** What a new or renewed session tells the client. */
export async function presentSession(context: Context, tokens: SessionTokens): Promise<{ user: Me; expiresAt: string }> {
  const row = await personById(context.db, tokens.userId)
  if (!row) throw new Error(`A session of user ${tokens.userId}, who is not there.`)
  return { user: presentMe(context, { ...row, roles: rolesOf(row) }), expiresAt: new Date(tokens.expiresAt).toISOString() }
}
