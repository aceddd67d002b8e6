/** What a failed sending means: never again for this letter, later, or the mail server itself can't be used now. */
export type SendFailure = { kind: 'refused' | 'later' | 'no-server'; words: string }

const serverTrouble = new Set(['ECONNECTION', 'ETIMEDOUT', 'ESOCKET', 'EDNS', 'ETLS', 'EPROXY', 'EAUTH', 'ENOAUTH', 'EPROTOCOL', 'ECONFIG'])

/**
 * A 5xx about the recipient or the message is the last word. A 4xx, a refused sender or sign-in and a server that can't
 * be reached may be put right by waiting or by the admin.
 */
export function readSendFailure(error: unknown): SendFailure {
  const { code, responseCode, command, response, message } = facts(error)
  const words = (response ?? message).replace(/\s+/g, ' ').trim().slice(0, 500)
  if (responseCode !== null) {
    const aboutThisLetter = command === 'RCPT TO' || command === 'DATA'
    if (aboutThisLetter && responseCode >= 500) return { kind: 'refused', words }
  } else if (code === 'EENVELOPE' || code === 'EMESSAGE') {
    return { kind: 'refused', words }
  }
  return { kind: code !== null && serverTrouble.has(code) ? 'no-server' : 'later', words }
}

function facts(error: unknown) {
  const given = (typeof error === 'object' && error !== null ? error : {}) as Record<string, unknown>
  const text = (value: unknown) => (typeof value === 'string' ? value : null)
  return {
    code: text(given['code']),
    responseCode: typeof given['responseCode'] === 'number' ? given['responseCode'] : null,
    command: text(given['command']),
    response: text(given['response']),
    message: error instanceof Error ? error.message : String(error),
  }
}
