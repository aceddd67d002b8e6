import type { Context } from '../context'
import { dueLetters, type DueLetter } from '../queries/letters'
import { waitAfter } from './retry-times'
import { readSendFailure, type SendFailure } from './send-failure'
import { closeTransport, mailTransport, type MailTransport } from './transport'

export interface DeliveryReport {
  delivered: number
  postponed: number
  failed: number
}

interface DeliveryState {
  running: Promise<DeliveryReport> | null
  /** Asked for while one ran: letters may have come in behind its back. */
  again: boolean
  /** Sent, but the database could not be told yet: told first, never sent again. */
  sent: Set<number>
}

const batch = 5
/** Letters that hold a link with a secret; their text is not kept once they are delivered. */
const kindsWithSecret = new Set(['invitation', 'password-reset'])
const states = new WeakMap<Context, DeliveryState>()

function stateOf(context: Context): DeliveryState {
  const known = states.get(context) ?? { running: null, again: false, sent: new Set<number>() }
  states.set(context, known)
  return known
}

/**
 * Sends every letter that is due; a second call while one runs joins it. A letter is marked after the server has
 * taken it, so a process killed in between sends it once more under the same Message-ID, and never loses it.
 */
export function deliverDue(context: Context): Promise<DeliveryReport> {
  const state = stateOf(context)
  if (state.running) {
    state.again = true
    return state.running
  }
  const transport = mailTransport(context)
  if (!transport) return Promise.resolve({ delivered: 0, postponed: 0, failed: 0 })
  state.running = deliverAll(context, state, transport)
  return state.running
}

/** Waits for a running delivery and closes the connections. */
export async function stopDelivery(context: Context): Promise<void> {
  await stateOf(context).running?.catch(() => undefined)
  closeTransport(context)
}

async function deliverAll(context: Context, state: DeliveryState, transport: MailTransport): Promise<DeliveryReport> {
  const report: DeliveryReport = { delivered: 0, postponed: 0, failed: 0 }
  try {
    do {
      state.again = false
      const due = await dueLetters(context.db, context.clock.system(), batch)
      const outcomes = await Promise.all(due.map((letter) => deliver(context, state, transport, letter)))
      for (const outcome of outcomes) report[outcome.result] += 1
      if (due.length > 0) context.news.tell({ topic: 'letters' })
      // Without a server the rest would only wait for the same time-out; they stay due for the next call.
      if (outcomes.some((outcome) => outcome.noServer)) break
      state.again ||= due.length > 0
    } while (state.again)
    return report
  } finally {
    // In the same turn as the last look at `again`, so that no call is lost in between.
    state.running = null
  }
}

interface Outcome {
  result: keyof DeliveryReport
  noServer: boolean
}

async function deliver(context: Context, state: DeliveryState, transport: MailTransport, letter: DueLetter): Promise<Outcome> {
  if (!state.sent.has(letter.id)) {
    try {
      await transport.send(letter)
    } catch (error) {
      return markFailure(context, letter, readSendFailure(error))
    }
    state.sent.add(letter.id)
  }
  await markDelivered(context, letter)
  state.sent.delete(letter.id)
  return { result: 'delivered', noServer: false }
}

async function markDelivered(context: Context, letter: DueLetter): Promise<void> {
  const noLongerNeeded = kindsWithSecret.has(letter.kind) ? { textPart: 'The link was delivered and is not kept.', htmlPart: null } : {}
  await context.db.write((tx) =>
    context.models.letters.update(
      {
        state: 'delivered',
        attempts: letter.attempts + 1,
        deliveredAt: context.clock.now(),
        nextAttemptAt: null,
        lastError: null,
        ...noLongerNeeded,
      },
      { where: { id: letter.id }, transaction: tx },
    ),
  )
}

async function markFailure(context: Context, letter: DueLetter, { kind, words }: SendFailure): Promise<Outcome> {
  const attempts = letter.attempts + 1
  const wait = kind === 'refused' ? null : waitAfter(attempts)
  context.log.warn({ letter: letter.id, attempts, words }, wait === null ? 'a letter failed for good' : 'a letter could not be sent yet')
  await context.db.write((tx) =>
    context.models.letters.update(
      {
        state: wait === null ? 'failed' : 'waiting',
        attempts,
        nextAttemptAt: wait === null ? null : context.clock.system() + wait,
        lastError: words,
      },
      { where: { id: letter.id }, transaction: tx },
    ),
  )
  return { result: wait === null ? 'failed' : 'postponed', noServer: kind === 'no-server' }
}
