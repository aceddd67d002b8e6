import type { Request } from 'express'

/** The personal token of an Authorization header; other schemes (a proxy's own, say) are none of ours. */
export function bearerOf(req: Request): string | null {
  const match = /^Bearer\s+(\S+)\s*$/i.exec(req.headers.authorization ?? '')
  return match?.[1] ?? null
}
