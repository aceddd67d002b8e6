import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { serve } from './serve'

const beatMs = 20_000

/** What changed, as server-sent events; the pages ask again for what they show. */
export function streamRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.stream, ({ res }) => {
    res.set({ 'Content-Type': 'text/event-stream', 'Cache-Control': 'no-store', 'X-Accel-Buffering': 'no' })
    res.flushHeaders()
    res.write('retry: 3000\n\n')
    const stop = context.news.listen((change) => res.write(`event: change\ndata: ${JSON.stringify(change)}\n\n`))
    const beat = setInterval(() => res.write(': beat\n\n'), beatMs)
    res.on('close', () => {
      stop()
      clearInterval(beat)
    })
  })
}
