import { HostRests, PullFailed, PullStopped } from './pull-failed'

const words: Record<string, string> = {
  ENOTFOUND: 'has a name that nobody knows',
  EAI_AGAIN: 'could not be looked up: the name service does not answer',
  ECONNREFUSED: 'takes no connection',
  ECONNRESET: 'cut the connection',
  EPIPE: 'cut the connection',
  ETIMEDOUT: 'does not answer',
  EHOSTUNREACH: 'cannot be reached',
  ENETUNREACH: 'cannot be reached',
  HPE_HEADER_OVERFLOW: 'answers with too many headers',
}

/** A connection that was cut on the way; what came before can be kept. */
export class Cut extends Error {
  override name = 'Cut'
}

const codeOf = (error: unknown): string => (error instanceof Error && 'code' in error && typeof error.code === 'string' ? error.code : '')

/** A fault of the connection before any answer came. */
export function connectionFault(error: unknown, host: string, signal: AbortSignal): Error {
  if (error instanceof PullFailed || error instanceof HostRests) return error
  if (signal.aborted) return new PullStopped('Offing stops.')
  const code = codeOf(error)
  const known = words[code]
  if (known) return new PullFailed(`${host} ${known}.`, { endsRun: true, cause: error })
  if (/CERT|TLS|SSL|SELF_SIGNED|UNABLE_TO_/.test(code)) {
    return new PullFailed(`${host} has no certificate that can be trusted (${code}).`, { endsRun: true, cause: error })
  }
  if (/^HPE_/.test(code)) return new PullFailed(`${host} answers with something that is no HTTP.`, { endsRun: true, cause: error })
  return new PullFailed(`${host} could not be asked${code ? ` (${code})` : ''}.`, { endsRun: true, cause: error })
}

/** A fault while the file itself was coming: anything the network did is a cut, anything else is our own. */
export function bodyFault(error: unknown, signal: AbortSignal): unknown {
  if (error instanceof PullFailed || error instanceof HostRests || error instanceof Cut) return error
  if (signal.aborted) return new PullStopped('Offing stops.')
  const code = codeOf(error)
  const ofNetwork = code in words || code === 'ERR_STREAM_PREMATURE_CLOSE' || code.startsWith('HPE_') || /SSL|TLS/.test(code)
  return ofNetwork ? new Cut('The connection was cut.', { cause: error }) : error
}
