import { issueToken } from '../accounts/tokens'
import type { Context } from '../context'

/** A personal token for somebody with an account, printed by the command as its last line. Throws a sentence if there is none. */
export async function createToken(context: Context, { email }: { email: string }): Promise<string> {
  const user = await context.models.users.findOne({ where: { email: email.trim().toLowerCase() } })
  if (!user) throw new Error(`Nobody has the e-mail address ${email}. Make an account first.`)
  if (user.disabled) throw new Error(`The account of ${email} is disabled.`)
  const { token } = await issueToken(context, user.id, { name: 'made by command', expiresInDays: null })
  return token
}
