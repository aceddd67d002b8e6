import { z } from 'zod'
import { id, instant } from './common'
import { email, password, personName, role } from './users'

export const credentials = z.object({ email, password: z.string().min(1).max(200) })

export const me = z.object({
  id,
  email: z.string(),
  name: z.string(),
  roles: z.array(role),
  timeZone: z.string(),
  /** True in the demo, so that every page can say so. */
  demo: z.boolean(),
  /** True where a local mail page exists (demo and development). */
  mailPage: z.boolean(),
})
export type Me = z.infer<typeof me>

export const session = z.object({ user: me, expiresAt: instant })
export const forgotPassword = z.object({ email })
export const resetPassword = z.object({ token: z.string().min(20).max(200), password })
export const acceptInvitation = z.object({ token: z.string().min(20).max(200), name: personName.optional(), password })
