import { z } from 'zod'
import { endpoints } from '../../shared/schemas/endpoints'

const key = 'offing.session-expires'
const listeners = new Set<() => void>()
let renewing: Promise<boolean> | undefined

/** Called when the session was renewed: the event stream reopens with the new cookie. */
export function onSessionRenewed(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

export function sessionExpiresAt(): number | undefined {
  const stored = localStorage.getItem(key)
  return stored ? Date.parse(stored) : undefined
}

export function rememberExpiry(expiresAt: string | undefined): void {
  if (expiresAt) localStorage.setItem(key, expiresAt)
  else localStorage.removeItem(key)
}

/** Renews the session once for all who ask at the same time; false when it is over. */
export function renewSession(): Promise<boolean> {
  renewing ??= renew().finally(() => {
    renewing = undefined
  })
  return renewing
}

async function renew(): Promise<boolean> {
  const reply = await fetch(`/api${endpoints.refresh.path}`, { method: 'POST', credentials: 'same-origin' }).catch(() => undefined)
  if (!reply?.ok) return false
  const session = z.object({ expiresAt: z.string() }).safeParse(await reply.json().catch(() => undefined))
  if (session.success) rememberExpiry(session.data.expiresAt)
  listeners.forEach((listener) => listener())
  return true
}
