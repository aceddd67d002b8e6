export const roles = ['researcher', 'analyst', 'officer', 'admin'] as const
export type Role = (typeof roles)[number]

/** The one table of who may do what. The server refuses by it, the client hides by it, a test walks it. */
export const permissions = {
  read: ['researcher', 'analyst', 'officer', 'admin'],
  'account:own': ['researcher', 'analyst', 'officer', 'admin'],
  'alert:note': ['researcher', 'analyst', 'officer', 'admin'],
  'region:edit': ['analyst', 'admin'],
  'rule:edit': ['analyst', 'admin'],
  'file:upload': ['analyst', 'admin'],
  'feed:confirm': ['analyst', 'admin'],
  'layer:suspect': ['analyst', 'officer', 'admin'],
  'alert:act': ['officer', 'admin'],
  'feed:edit': ['admin'],
  'people:edit': ['admin'],
  'subscription:any': ['admin'],
  'file:any': ['admin'],
  'job:any': ['admin'],
  'letter:any': ['admin'],
  'audit:read': ['admin'],
  'metrics:read': ['admin'],
} as const satisfies Record<string, readonly Role[]>

export type Action = keyof typeof permissions

export function can(person: { roles: readonly Role[] } | null | undefined, action: Action): boolean {
  if (!person) return false
  const allowed: readonly Role[] = permissions[action]
  return person.roles.some((role) => allowed.includes(role))
}
