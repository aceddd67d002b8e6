import { z } from 'zod'
import { roles } from '../permissions'
import { id, instant, timeZone, version } from './common'

export const role = z.enum(roles)
export const roleSet = z.array(role).min(1, 'A person needs at least one role.').transform((set) => [...new Set(set)])
export const email = z.string().trim().toLowerCase().max(254).pipe(z.email('This is not an e-mail address.'))
export const password = z
  .string()
  .min(10, 'A password needs at least 10 characters.')
  .max(200, 'A password may have at most 200 characters.')
  .refine((text) => new TextEncoder().encode(text).length <= 72, 'A password may have at most 72 bytes.')
export const personName = z.string().trim().min(1, 'A name is needed.').max(100)

export const user = z.object({
  id,
  email: z.string(),
  name: z.string(),
  roles: z.array(role),
  timeZone: z.string(),
  phone: z.string().nullable(),
  disabled: z.boolean(),
  createdAt: instant,
  lastSeenAt: instant.nullable(),
  version,
})
export type User = z.infer<typeof user>

export const newUser = z.object({
  email,
  name: personName,
  roles: roleSet,
  password,
  timeZone: timeZone.default('UTC'),
  phone: z.string().trim().max(40).nullable().default(null),
})

export const userChange = z.object({
  version,
  name: personName.optional(),
  roles: roleSet.optional(),
  timeZone: timeZone.optional(),
  phone: z.string().trim().max(40).nullable().optional(),
  disabled: z.boolean().optional(),
})

export const newInvitation = z.object({ email, name: personName, roles: roleSet })
export const invitation = z.object({
  id,
  email: z.string(),
  name: z.string(),
  roles: z.array(role),
  createdAt: instant,
  expiresAt: instant,
  acceptedAt: instant.nullable(),
})

export const token = z.object({
  id,
  name: z.string(),
  createdAt: instant,
  lastUsedAt: instant.nullable(),
  expiresAt: instant.nullable(),
})
export type Token = z.infer<typeof token>
export const newToken = z.object({
  name: z.string().trim().min(1).max(100),
  expiresInDays: z.number().int().min(1).max(3650).nullable().default(null),
})
export const issuedToken = token.extend({ token: z.string() })
