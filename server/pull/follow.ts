import type { LookupAddress } from 'node:dns'
import type { IncomingMessage, OutgoingHttpHeaders } from 'node:http'
import { softwareVersion } from '../software-version'
import { connectionFault } from './failure-words'
import type { Network } from './network'
import { PullFailed } from './pull-failed'
import { ask } from './request'

export interface Question {
  url: URL
  headers: OutgoingHttpHeaders
  /** Sent to the server of `url` only, never to where it sends us on. */
  authorization: string | null
  /** Throws where a host wants to be left alone. */
  mayAsk: (host: string) => Promise<void>
}

const mostRedirects = 5
const redirects = [301, 302, 303, 307, 308]

/** Asks, and asks on where it is sent on, every address checked like the first. The turn at a host lasts until `use` is done with the answer. */
export async function follow<T>(network: Network, question: Question, use: (response: IncomingMessage, url: URL) => Promise<T>): Promise<T> {
  let url = question.url
  for (let hop = 0; hop <= mostRedirects; hop++) {
    const answer = await network.turns.take(url.host, () => askOnce(network, question, url, use))
    if (!(answer instanceof URL)) return answer.value
    url = answer
  }
  throw new PullFailed(`${question.url.host} sends on more than ${mostRedirects} times.`, { endsRun: true, lasting: true })
}

async function askOnce<T>(network: Network, question: Question, url: URL, use: (response: IncomingMessage, url: URL) => Promise<T>): Promise<URL | { value: T }> {
  const { signal } = network.stopping
  await question.mayAsk(url.host)
  const addresses = await admitted(network, url)
  const headers: OutgoingHttpHeaders = {
    'user-agent': `Offing/${softwareVersion}`,
    accept: '*/*',
    'accept-encoding': 'identity',
    ...question.headers,
    ...(question.authorization && url.origin === question.url.origin ? { authorization: question.authorization } : {}),
  }
  const response = await ask({ url, addresses, headers, limits: network.limits, signal })
  try {
    if (redirects.includes(response.statusCode ?? 0)) return nextOf(response, url)
    return { value: await use(response, url) }
  } finally {
    response.destroy()
  }
}

function nextOf(response: IncomingMessage, url: URL): URL {
  const { location } = response.headers
  if (location !== undefined && URL.canParse(location, url)) return new URL(location, url)
  throw new PullFailed(`${url.host} sends on without saying where.`, { endsRun: true })
}

async function admitted(network: Network, url: URL): Promise<LookupAddress[]> {
  let timer: ReturnType<typeof setTimeout> | undefined
  const late = new Promise<never>((_, reject) => {
    const sentence = `${url.hostname} could not be looked up in time.`
    timer = setTimeout(() => reject(new PullFailed(sentence, { endsRun: true })), network.limits.connectMs)
  })
  try {
    return await Promise.race([network.gate.admit(url), late])
  } catch (error) {
    throw connectionFault(error, url.hostname, network.stopping.signal)
  } finally {
    clearTimeout(timer)
  }
}
