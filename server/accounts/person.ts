import type { Role } from '../../shared/permissions'

/** Who is calling: read anew for each request, so that a changed role or a disabled account acts at once. */
export interface Person {
  id: number
  email: string
  name: string
  roles: Role[]
  timeZone: string
  /** The session or the personal token that was shown. */
  by: { sessionId: number } | { tokenId: number }
}
