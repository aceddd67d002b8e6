import type { IncomingMessage } from 'node:http'
import { PullFailed } from './pull-failed'
import { retryAfter } from './retry-after'

/** What an answer other than a file means. */
export function refusedAnswer(response: IncomingMessage, url: URL, now: number): PullFailed {
  const status = response.statusCode ?? 0
  if (status === 429 || status === 503) {
    const until = retryAfter(response.headers['retry-after'], now)
    const sentence = status === 429 ? `${url.host} says it is asked too often (429).` : `${url.host} is out of service for now (503).`
    return new PullFailed(sentence, { endsRun: true, rest: { host: url.host, until } })
  }
  if (status === 401) return new PullFailed(`${url.host} does not accept the credentials, or wants some (401).`, { endsRun: true, lasting: true })
  if (status === 403) return new PullFailed(`${url.host} does not allow this address to be fetched (403).`, { endsRun: true, lasting: true })
  return new PullFailed(`${url.host} answers with status ${status}.`, { lasting: status < 500 })
}
