import { useQueryClient } from '@tanstack/react-query'
import { useEffect } from 'react'
import { onSessionRenewed, renewSession } from '../api/session'
import { queriesOfTopic, readChange, topics, type Topic } from '../api/stream'

const pollMs = 30_000
const gatherMs = 150
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
    const waiting = new Set<Topic>()

    const refreshWaiting = () => {
      flush = undefined
      const keys = new Set([...waiting].flatMap((topic) => queriesOfTopic[topic]))
      waiting.clear()
      keys.forEach((key) => void client.invalidateQueries({ queryKey: [key] }))
    }
    const changed = (changes: readonly Topic[]) => {
      changes.forEach((topic) => waiting.add(topic))
      flush ??= setTimeout(refreshWaiting, gatherMs)
    }
    const renew = () => {
      renewal = undefined
      void renewSession()
    }
    const open = () => {
      source?.close()
      source = new EventSource('/api/stream')
      source.addEventListener('open', () => {
        // Whatever happened while nobody listened is unknown, so everything is asked again.
        if (poll) changed(topics)
        clearInterval(poll)
        poll = undefined
      })
      source.addEventListener('change', (event: MessageEvent<string>) => {
        const change = readChange(event.data)
        if (change) changed([change.topic])
      })
      source.addEventListener('error', () => {
        poll ??= setInterval(() => {
          changed(topics)
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
