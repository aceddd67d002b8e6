import { z } from 'zod'
import type { Context } from '../context'
import type { Transaction } from '../db'
import { insertLetterOnce } from '../queries/letters'

export interface NewLetter {
  kind: string
  /** One letter for one key, however often it is asked for. */
  dedupeKey: string
  userId: number | null
  to: string
  subject: string
  text: string
  html: string | null
  alertId?: number | null
  /** From `messageIdFor`; kept over retries, so that a letter sent twice is told as one. */
  messageId: string
  inReplyTo?: string | null
}

const address = z.email()
const messageIdShape = /^<[^\s<>@]+@[^\s<>@]+>$/

/**
 * Puts a letter into the outbox, in the transaction of what it tells about; answers whether it is new. Nothing typed
 * by a person can become a header of its own: an address must be one address, a subject is one line.
 */
export async function enqueueLetter(context: Context, tx: Transaction, letter: NewLetter): Promise<boolean> {
  if (!address.safeParse(letter.to).success) throw new Error(`A letter needs one plain e-mail address, not ${JSON.stringify(letter.to)}.`)
  for (const id of [letter.messageId, letter.inReplyTo]) {
    if (id != null && !messageIdShape.test(id)) throw new Error(`This is not a message id: ${JSON.stringify(id)}.`)
  }
  return insertLetterOnce(
    context.db,
    {
      kind: letter.kind,
      dedupeKey: letter.dedupeKey,
      userId: letter.userId,
      toAddress: letter.to,
      alertId: letter.alertId ?? null,
      messageId: letter.messageId,
      inReplyTo: letter.inReplyTo ?? null,
      subject: oneLine(letter.subject),
      textPart: letter.text,
      htmlPart: letter.html,
      nextAttemptAt: context.clock.system(),
      createdAt: context.clock.now(),
    },
    tx,
  )
}

/** The same key and instant give the same id; the instant keeps a new database from repeating the ids of an old one. */
export function messageIdFor(context: Context, key: string, at: number): string {
  const local = key.toLowerCase().replace(/[^a-z0-9]+/g, '-').replace(/^-|-$/g, '')
  return `<${local}.${at.toString(36)}@${new URL(context.env.baseUrl).hostname.replace(/[^a-z0-9.-]/gi, '')}>`
}

function oneLine(text: string): string {
  // Control characters and the two line separators of Unicode.
  return text.replace(/[\p{Cc}\u2028\u2029]+/gu, ' ').trim().slice(0, 250)
}
