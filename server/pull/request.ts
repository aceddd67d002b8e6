import type { LookupAddress } from 'node:dns'
import { request as askPlain, type IncomingMessage, type OutgoingHttpHeaders } from 'node:http'
import { request as askTls } from 'node:https'
import type { LookupFunction } from 'node:net'
import { connectionFault, Cut } from './failure-words'
import type { PullLimits } from './network'
import { PullFailed } from './pull-failed'

interface Asked {
  url: URL
  /** Checked before; the connection goes to these and no others, whatever a name service would say now. */
  addresses: LookupAddress[]
  headers: OutgoingHttpHeaders
  limits: PullLimits
  signal: AbortSignal
}

const pinnedTo = (addresses: LookupAddress[]): LookupFunction => (_host, options, done) => {
  const [first] = addresses
  if (options.all) done(null, addresses)
  else done(null, first?.address ?? '', first?.family)
}

/** One GET on a connection of its own, answered once the headers are there. The body falls silent or late only so long. */
export function ask({ url, addresses, headers, limits, signal }: Asked): Promise<IncomingMessage> {
  const secure = url.protocol === 'https:'
  return new Promise((resolve, reject) => {
    const request = (secure ? askTls : askPlain)(url, { headers, lookup: pinnedTo(addresses), agent: false, signal })
    let timer = setTimeout(() => late('takes no connection'), limits.connectMs)
    const late = (what: string) => request.destroy(new PullFailed(`${url.host} ${what} in time.`, { endsRun: true }))
    const connected = () => {
      clearTimeout(timer)
      timer = setTimeout(() => late('does not answer'), limits.headersMs)
    }
    request.on('socket', (socket) => socket.once(secure ? 'secureConnect' : 'connect', connected))
    request.once('error', (error) => {
      clearTimeout(timer)
      reject(connectionFault(error, url.host, signal))
    })
    request.once('response', (response) => {
      clearTimeout(timer)
      // The request's own error after this point is told by the response too.
      request.on('error', () => undefined)
      watchBody(response, limits)
      resolve(response)
    })
    request.end()
  })
}

function watchBody(response: IncomingMessage, limits: PullLimits): void {
  const cut = (why: string) => () => response.destroy(new Cut(why))
  const whole = setTimeout(cut('It took too long.'), limits.wholeMs)
  let idle = setTimeout(cut('It fell silent.'), limits.idleMs)
  response.on('data', () => {
    clearTimeout(idle)
    idle = setTimeout(cut('It fell silent.'), limits.idleMs)
  })
  // Listening starts the flow; it waits again until somebody reads.
  response.pause()
  response.once('close', () => {
    clearTimeout(idle)
    clearTimeout(whole)
  })
}
