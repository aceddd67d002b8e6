import type { IncomingMessage, OutgoingHttpHeaders } from 'node:http'
import type { Env } from '../env'
import type { Arrived } from '../pipeline/stored-files'
import { bodyFault, Cut } from './failure-words'
import { follow, type Question } from './follow'
import { openLanding, type Landing } from './landing'
import type { Network } from './network'
import { PullFailed } from './pull-failed'
import { refusedAnswer } from './refused-answer'

export interface Validators {
  etag: string | null
  lastModified: string | null
}

export type Fetched = { kind: 'fetched'; arrived: Arrived; validators: Validators } | { kind: 'unchanged' } | { kind: 'not-there' }

export interface FileAsked extends Omit<Question, 'headers'> {
  /** What the address gave last time; null when it never did. */
  known: Validators | null
  now: number
}

const mostTries = 10
const mostTriesInVain = 3

interface Progress {
  landing: Landing
  /** Of the bytes landed so far: the rest is asked for only while they are still of the same file. */
  validators: Validators
}

/** Fetches one file, going on where a cut connection left it. What it answers with has to be kept or dropped by the caller. */
export async function fetchFile(env: Env, network: Network, asked: FileAsked): Promise<Fetched> {
  const progress: Progress = { landing: await openLanding(env), validators: { etag: null, lastModified: null } }
  try {
    const fetched = await triedUntilWhole(network, asked, progress)
    if (fetched !== 'whole') return await droppedAs(progress.landing, fetched)
    // An empty file is one its provider is still writing.
    if (progress.landing.size === 0) return await droppedAs(progress.landing, { kind: 'not-there' })
    return { kind: 'fetched', arrived: await progress.landing.finish(), validators: progress.validators }
  } catch (error) {
    await progress.landing.drop()
    throw error
  }
}

async function droppedAs(landing: Landing, fetched: Fetched): Promise<Fetched> {
  await landing.drop()
  return fetched
}

async function triedUntilWhole(network: Network, asked: FileAsked, progress: Progress): Promise<'whole' | Fetched> {
  const { landing } = progress
  let inVain = 0
  for (let tries = 1; ; tries++) {
    const before = landing.size
    try {
      return await follow(network, { ...asked, headers: headersFor(asked, progress) }, (response, url) => take(response, url, asked, progress))
    } catch (error) {
      const fault = bodyFault(error, network.stopping.signal)
      if (!(fault instanceof Cut)) throw fault
      inVain = landing.size > before ? 0 : inVain + 1
      if (inVain >= mostTriesInVain || tries >= mostTries) {
        throw new PullFailed(`${asked.url.host}: the connection was cut ${tries} times, last after ${landing.size} bytes.`, { cause: fault })
      }
    }
  }
}

function headersFor({ known }: FileAsked, { landing, validators }: Progress): OutgoingHttpHeaders {
  const validator = strongOf(validators)
  if (landing.size > 0 && validator) return { range: `bytes=${landing.size}-`, 'if-range': validator }
  if (!known) return {}
  return {
    ...(known.etag ? { 'if-none-match': known.etag } : {}),
    ...(known.lastModified ? { 'if-modified-since': known.lastModified } : {}),
  }
}

/** A weak tag promises the same meaning, not the same bytes. */
function strongOf({ etag, lastModified }: Validators): string | null {
  return etag === null ? lastModified : etag.startsWith('W/') ? null : etag
}

async function take(response: IncomingMessage, url: URL, asked: FileAsked, progress: Progress): Promise<'whole' | Fetched> {
  const { landing } = progress
  const status = response.statusCode ?? 0
  if (status === 304 && asked.known) return { kind: 'unchanged' }
  if (status === 404 || status === 410) return { kind: 'not-there' }
  if (status === 416 || (status === 206 && !goesOn(response, landing))) return startAgain(progress)
  if (status !== 200 && status !== 206) throw refusedAnswer(response, url, asked.now)
  if (/^text\/html\b/i.test(response.headers['content-type'] ?? '')) {
    throw new PullFailed(`${url.host} answers with a page instead of a file. It may want credentials, or others.`, { endsRun: true, lasting: true })
  }
  if (status === 200) {
    await landing.restart()
    progress.validators = { etag: response.headers.etag ?? null, lastModified: response.headers['last-modified'] ?? null }
  }
  await land(response, landing)
  return 'whole'
}

async function land(response: IncomingMessage, landing: Landing): Promise<void> {
  const declared = response.headers['content-length']
  const whole = declared === undefined ? null : landing.size + Number(declared)
  landing.expect(Number(declared ?? 0))
  for await (const chunk of response) await landing.add(chunk as Buffer)
  if (!response.complete || (whole !== null && landing.size !== whole)) throw new Cut('It ended early.')
}

/** Whether a part begins where the bytes landed so far end. */
function goesOn(response: IncomingMessage, landing: Landing): boolean {
  const range = /^bytes (\d+)-\d+\/(?:\d+|\*)$/.exec(response.headers['content-range'] ?? '')
  return landing.size > 0 && Number(range?.[1]) === landing.size
}

async function startAgain(progress: Progress): Promise<never> {
  await progress.landing.restart()
  progress.validators = { etag: null, lastModified: null }
  throw new Cut('The rest did not fit what came before.')
}
