import { useEffect } from 'react'
import { onSessionRenewed, renewSession, sessionExpiresAt } from '../api/session'

const aheadMs = 60_000

/** Renews the session a minute before it ends, so that pictures and the stream never meet a dead cookie. */
export function useSessionRenewal(): void {
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined
    const plan = () => {
      clearTimeout(timer)
      const expiresAt = sessionExpiresAt()
      if (expiresAt) timer = setTimeout(due, Math.max(1000, expiresAt - Date.now() - aheadMs))
    }
    const due = () => {
      // Another tab may have done it already.
      const left = (sessionExpiresAt() ?? 0) - Date.now()
      if (left > aheadMs) plan()
      else void renewSession()
    }
    plan()
    const forget = onSessionRenewed(plan)
    return () => {
      forget()
      clearTimeout(timer)
    }
  }, [])
}
