import { useQueryClient } from '@tanstack/react-query'
import { useEffect } from 'react'
import { onSessionRenewed, renewSession } from '../api/session'
import { readChange, staleQueries, topics, type Change, type StaleQueries } from '../api/stream'

const pollMs = 30_000
/** A change is on screen at once; while more keep coming, as when years are read, pages ask again every other second. */
const gatherMs = 150
const betweenMs = 2_000
const leavingMs = 1_000

/**
 * Keeps what is on screen as new as the server's: listens to the event stream and makes the queries of a changed topic
 * old. While the stream is down it asks every half minute and tries to open it again.
 */
export function useStream(): void {
  const client = useQueryClient()
  useEffect(() => {
    let source: EventSource | undefined
    let poll: ReturnType<typeof setInterval> | undefined
    let flush: ReturnType<typeof setTimeout> | undefined
    let renewal: ReturnType<typeof setTimeout> | undefined
    const waiting = new Map<string, StaleQueries>()
    let refreshedAt = -Infinity

    const refreshWaiting = () => {
      flush = undefined
      refreshedAt = performance.now()
      const queries = [...waiting.values()]
      waiting.clear()
      for (const { queryKey, exact = false } of queries) void client.invalidateQueries({ queryKey, exact })
    }
    const changed = (changes: readonly Change[]) => {
      for (const query of changes.flatMap(staleQueries)) waiting.set(JSON.stringify(query), query)
      flush ??= setTimeout(refreshWaiting, Math.max(gatherMs, refreshedAt + betweenMs - performance.now()))
    }
    const everything = topics.map((topic) => ({ topic }))
    const renew = () => {
      renewal = undefined
      void renewSession()
    }
    const open = () => {
      source?.close()
      source = new EventSource('/api/stream')
      source.addEventListener('open', () => {
        // Whatever happened while nobody listened is unknown, so everything is asked again.
        if (poll) changed(everything)
        clearInterval(poll)
        poll = undefined
      })
      source.addEventListener('change', (event: MessageEvent<string>) => {
        const change = readChange(event.data)
        if (change) changed([change])
      })
      source.addEventListener('error', () => {
        poll ??= setInterval(() => {
          changed(everything)
          if (source?.readyState === EventSource.CLOSED) open()
        }, pollMs)
        // Closed for good means refused: the session has run out. Renewing it reopens the stream. A page that is being
        // left closes its stream too; it must not ask for a renewal whose answer nobody will be there to receive.
        if (source?.readyState === EventSource.CLOSED) renewal ??= setTimeout(renew, leavingMs)
      })
    }

    open()
    const forget = onSessionRenewed(open)
    return () => {
      forget()
      source?.close()
      clearInterval(poll)
      clearTimeout(flush)
      clearTimeout(renewal)
    }
  }, [client])
}
