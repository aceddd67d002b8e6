import { z } from 'zod'
import { password } from '../../shared/schemas/users'

/** A password typed twice, so that nobody is locked out by a slip of the finger. */
export const newPassword = z
  .object({ password, again: z.string() })
  .refine((given) => given.password === given.again, { message: 'The two are not the same.', path: ['again'] })
