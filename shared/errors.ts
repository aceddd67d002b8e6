/** Closed lists: every code a reply or a refused file may carry, each with its status or its meaning. */
export const errorStatus = {
  'bad-request': 400,
  'not-signed-in': 401,
  'wrong-credentials': 401,
  'session-expired': 401,
  'not-allowed': 403,
  'not-found': 404,
  'stale-version': 409,
  conflict: 409,
  'event-running': 409,
  'already-used': 410,
  'too-large': 413,
  'not-valid': 422,
  'too-many-requests': 429,
  'server-error': 500,
  unavailable: 503,
} as const

export type ErrorCode = keyof typeof errorStatus

/** Why a file was refused; the sentence for a person is written where the code is thrown, with its facts. */
export const refusalCodes = [
  'empty-file',
  'unknown-format',
  'truncated',
  'damaged',
  'unsupported-encoding',
  'too-large',
  'no-grid',
  'unknown-place',
  'no-time',
  'unknown-time',
  'climatology',
  'not-surface',
  'no-quantity',
  'unknown-unit',
  'not-this-feed',
  'reading-failed',
  'reading-ended',
  'not-readable',
] as const

export type RefusalCode = (typeof refusalCodes)[number]
