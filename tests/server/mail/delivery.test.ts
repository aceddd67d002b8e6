import { SMTPServer } from 'smtp-server'
import type { AddressInfo } from 'node:net'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { startMailCatcher, type MailCatcher } from '../../../server/mail/catcher'
import { deliverDue } from '../../../server/mail/delivery'
import { enqueueLetter, messageIdFor } from '../../../server/mail/outbox'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
const servers: (() => Promise<void>)[] = []
const minute = 60_000

beforeEach(async () => {
  context = await createTestContext()
})
afterEach(async () => {
  await context.close()
  await Promise.all(servers.splice(0).map((close) => close()))
})

async function letter(key: string, to = 'officer@example.org') {
  const text = `Letter ${key}`
  return context.db.write((tx) =>
    enqueueLetter(context, tx, {
      kind: 'alert', dedupeKey: key, userId: null, to, subject: text, text, html: `<p>${text}</p>`, messageId: messageIdFor(context, key, 1000),
    }),
  )
}

const rowOf = async (key: string) => (await context.models.letters.findOne({ where: { dedupeKey: key } }))!.get()

/** A catcher on a port that stays the same when it is closed and started again. */
async function catcherOn(port: number): Promise<MailCatcher> {
  const catcher = await startMailCatcher({ port, host: '127.0.0.1', dir: `${context.env.dataDir}/caught`, clock: context.clock })
  servers.push(catcher.close)
  context.env.smtpUrl = catcher.url
  return catcher
}

/** A server that answers as the test says, for the recipient or at the end of the message. */
async function serverThat(answers: { recipient?: (address: string) => number | null; data?: () => number | null }) {
  const taken: string[] = []
  const refuse = (code: number) => Object.assign(new Error(code >= 500 ? 'No such mailbox here' : 'Come back later'), { responseCode: code })
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onRcptTo: ({ address }, _session, done) => {
      const code = answers.recipient?.(address) ?? null
      done(code === null ? null : refuse(code))
    },
    onData: (stream, session, done) => {
      stream.resume()
      stream.on('end', () => {
        const code = answers.data?.() ?? null
        if (code === null) taken.push(session.envelope.rcptTo[0]?.address ?? '')
        done(code === null ? null : refuse(code))
      })
    },
  })
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  servers.push(() => new Promise((resolve) => server.close(() => resolve())))
  context.env.smtpUrl = `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`
  return taken
}

describe('the outbox', () => {
  it('waits without a word while no mail server is set', async () => {
    await letter('one')
    expect(await deliverDue(context)).toEqual({ delivered: 0, postponed: 0, failed: 0 })
    expect(await rowOf('one')).toMatchObject({ state: 'waiting', attempts: 0 })
  })

  it('takes a letter once for one key, and gives it up with the transaction it belongs to', async () => {
    expect([await letter('one'), await letter('one')]).toEqual([true, false])
    const broken = context.db.write(async (tx) => {
      await enqueueLetter(context, tx, { kind: 'alert', dedupeKey: 'two', userId: null, to: 'a@example.org', subject: 's', text: 't', html: null, messageId: '<two@example.org>' })
      throw new Error('the alert could not be written')
    })
    await expect(broken).rejects.toThrow('the alert could not be written')
    expect(await context.models.letters.count()).toBe(1)
  })

  it('tries again after 1, 2 and 5 minutes while the server is down, and delivers once it is up', async () => {
    const first = await catcherOn(0)
    const port = Number(new URL(first.url).port)
    await first.close()
    await letter('one')
    for (const wait of [1, 2, 5]) {
      expect(await deliverDue(context)).toMatchObject({ postponed: 1 })
      const { nextAttemptAt } = await rowOf('one')
      expect(Math.round(((nextAttemptAt ?? 0) - context.clock.system()) / minute)).toBe(wait)
      expect(await deliverDue(context)).toEqual({ delivered: 0, postponed: 0, failed: 0 })
      context.clock.pass(wait * minute)
    }
    const catcher = await catcherOn(port)
    expect(await deliverDue(context)).toMatchObject({ delivered: 1 })
    expect(await rowOf('one')).toMatchObject({ state: 'delivered', attempts: 4, lastError: null, nextAttemptAt: null })
    expect(catcher.list().map(({ subject, messageId }) => [subject, messageId])).toEqual([['Letter one', '<one.rs@localhost>']])
  })

  it('gives up after 48 hours and keeps the last words', async () => {
    await serverThat({ recipient: () => 451 })
    await letter('one')
    const start = context.clock.system()
    for (let attempt = 0; attempt < 100 && (await rowOf('one')).state === 'waiting'; attempt++) {
      await deliverDue(context)
      context.clock.pass(Math.max(0, ((await rowOf('one')).nextAttemptAt ?? 0) - context.clock.system()))
    }
    expect(await rowOf('one')).toMatchObject({ state: 'failed', lastError: '451 Come back later' })
    expect(Math.round((context.clock.system() - start) / 3600_000)).toBe(48)
  })

  it('fails a refused recipient at once with the words of the server, and delivers to the others', async () => {
    const taken = await serverThat({ recipient: (address) => (address.startsWith('gone') ? 550 : null) })
    await letter('one', 'gone@example.org')
    await letter('two', 'here@example.org')
    expect(await deliverDue(context)).toEqual({ delivered: 1, postponed: 0, failed: 1 })
    expect(await rowOf('one')).toMatchObject({ state: 'failed', lastError: '550 No such mailbox here', nextAttemptAt: null })
    expect(taken).toEqual(['here@example.org'])
  })

  it('tries a message again that the server could not take just now', async () => {
    let full = true
    const taken = await serverThat({ data: () => (full ? 452 : null) })
    await letter('one')
    expect(await deliverDue(context)).toMatchObject({ postponed: 1 })
    full = false
    context.clock.pass(minute)
    expect(await deliverDue(context)).toMatchObject({ delivered: 1 })
    expect(taken).toHaveLength(1)
  })

  it('sends a letter once although two deliveries are asked for at the same time', async () => {
    const catcher = await catcherOn(0)
    for (let count = 0; count < 12; count++) await letter(`many ${count}`)
    await Promise.all([deliverDue(context), deliverDue(context), deliverDue(context)])
    expect(catcher.list()).toHaveLength(12)
    expect(new Set(catcher.list().map(({ messageId }) => messageId)).size).toBe(12)
  })

  it('does not send again what was sent, when the database could not be told in time', async () => {
    const catcher = await catcherOn(0)
    await letter('one')
    const { write } = context.db
    context.db.write = () => Promise.reject(new Error('the disk is full'))
    await expect(deliverDue(context)).rejects.toThrow('the disk is full')
    context.db.write = write
    expect(await deliverDue(context)).toMatchObject({ delivered: 1 })
    expect(catcher.list()).toHaveLength(1)
  })
})
