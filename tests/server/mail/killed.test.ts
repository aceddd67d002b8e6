import { spawn, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import type { AddressInfo } from 'node:net'
import { SMTPServer } from 'smtp-server'
import { expect, it } from 'vitest'
import { deliverDue } from '../../../server/mail/delivery'
import { enqueueLetter, messageIdFor } from '../../../server/mail/outbox'
import { createTestContext } from '../../support/test-context'

it('a process killed between sending and marking sends the letter once more, under the same Message-ID', async () => {
  const context = await createTestContext()
  const taken: string[] = []
  let child: ChildProcess | null = null
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onData: (stream, _session, done) => {
      let raw = ''
      stream.on('data', (part: Buffer) => (raw += part.toString()))
      stream.on('end', () => {
        taken.push(/^Message-ID: (\S+)/im.exec(raw)?.[1] ?? '')
        // The server has the letter; the process dies before it hears so.
        child?.kill('SIGKILL')
        done()
      })
    },
  })
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  const smtpUrl = `smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`
  const key = 'alert:1:user:2'
  const messageId = messageIdFor(context, key, context.clock.now())
  await context.db.write((tx) =>
    enqueueLetter(context, tx, { kind: 'alert', dedupeKey: key, userId: null, to: 'officer@example.org', subject: 'Unusual', text: 'text', html: null, messageId }),
  )

  child = spawn(process.execPath, ['--import', 'tsx', 'tests/support/deliver-once.ts', context.env.dataDir, smtpUrl], { stdio: 'inherit' })
  const [, signal] = (await once(child, 'exit')) as [number | null, string | null]
  expect(signal).toBe('SIGKILL')
  expect((await context.models.letters.findOne())?.state).toBe('waiting')

  child = null
  context.env.smtpUrl = smtpUrl
  await deliverDue(context)
  await deliverDue(context)
  expect(taken).toEqual([messageId, messageId])
  expect((await context.models.letters.findOne())?.state).toBe('delivered')

  await context.close()
  await new Promise<void>((resolve) => server.close(() => resolve()))
})
