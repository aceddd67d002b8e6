import compression from 'compression'
import type { RequestHandler } from 'express'

/** Text goes out compressed; the event stream doesn't, since compressing would hold its messages back. */
export function compressed(): RequestHandler {
  return compression({
    filter: (req, res) => !String(res.getHeader('Content-Type') ?? '').startsWith('text/event-stream') && compression.filter(req, res),
  })
}
