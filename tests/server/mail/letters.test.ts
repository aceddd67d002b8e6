import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { createTransport } from 'nodemailer'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { startMailCatcher } from '../../../server/mail/catcher'
import { deliverDue } from '../../../server/mail/delivery'
import { escapeHtml, letterLayout } from '../../../server/mail/letters/layout'
import { enqueueLetter } from '../../../server/mail/outbox'
import { createTestClock } from '../../support/test-clock'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
beforeAll(async () => {
  context = await createTestContext({ mail: true })
})
afterAll(() => context.close())

const base = { kind: 'alert', userId: null, text: 'text', html: null }
const enqueue = (letter: { dedupeKey: string; to: string; subject: string; messageId: string }) =>
  context.db.write((tx) => enqueueLetter(context, tx, { ...base, ...letter }))

describe('a header', () => {
  it('cannot be added through a subject: line ends become spaces', async () => {
    const subject = 'Tarrow Bay\r\nBcc: everybody@example.org\u2028X-Other: yes'
    await enqueue({ dedupeKey: 'subject', to: 'officer@example.org', subject, messageId: '<subject@example.org>' })
    await deliverDue(context)
    const [caught] = context.mailCatcher?.list() ?? []
    expect(caught).toMatchObject({ to: ['officer@example.org'], subject: 'Tarrow Bay Bcc: everybody@example.org X-Other: yes', messageId: '<subject@example.org>' })
  })

  it.each(['a@example.org\r\nBcc: b@example.org', 'a@example.org, b@example.org', 'Name <a@example.org>', 'a@example.org\n', ''])(
    'cannot be added through an address: %j is refused',
    async (to) => {
      await expect(enqueue({ dedupeKey: `to ${to}`, to, subject: 's', messageId: '<to@example.org>' })).rejects.toThrow('one plain e-mail address')
    },
  )

  it('cannot be added through a message id', async () => {
    const wrong = enqueue({ dedupeKey: 'id', to: 'a@example.org', subject: 's', messageId: '<a@b>\r\nBcc: <c@d>' })
    await expect(wrong).rejects.toThrow('not a message id')
  })
})

describe('the frame of a letter', () => {
  const frame = { title: 'Tarrow <Bay>', preheader: '4.89 & more', bodyHtml: '<p>body</p>', footer: 'line one\nline two', demo: true }

  it('escapes what people typed and says where it is a demo', () => {
    const html = letterLayout({ ...frame, markWord: 'Severe', button: { label: 'See "why"', url: 'https://x.example/?a=1&b="2"' } })
    expect(html).toContain('Tarrow &lt;Bay&gt;')
    expect(html).not.toContain('<Bay>')
    expect(html).toContain('href="https://x.example/?a=1&amp;b=&quot;2&quot;"')
    expect(html).toContain('line one<br>line two')
    expect(html).toContain('>demo</span>')
    expect(html).toContain('Severe')
    expect(letterLayout({ ...frame, demo: false })).not.toContain('>demo</span>')
    expect(escapeHtml(`<a href='x'>&"`)).toBe('&lt;a href=&#39;x&#39;&gt;&amp;&quot;')
  })

  it('asks the reader for nothing from outside: no picture, no style sheet, no script', () => {
    const html = letterLayout(frame)
    expect(html).not.toMatch(/<(img|link|script|style)\b|url\(/)
  })
})

describe('the mail catcher', () => {
  it('keeps the newest letters over a restart', async () => {
    const dir = await mkdtemp(join(tmpdir(), 'offing-caught-'))
    const options = { port: 0, host: '127.0.0.1', dir, clock: createTestClock() }
    const first = await startMailCatcher(options)
    const mailer = createTransport(first.url)
    for (const subject of ['first', 'second']) {
      await mailer.sendMail({ from: 'a@example.org', to: 'b@example.org', subject, text: 'Grüße ≥ 3 mg m⁻³' })
    }
    await first.close()
    const again = await startMailCatcher(options)
    expect(again.list().map(({ subject }) => subject)).toEqual(['second', 'first'])
    expect(again.get(again.list()[0]?.id ?? '')).toMatchObject({ from: 'a@example.org', to: ['b@example.org'], text: 'Grüße ≥ 3 mg m⁻³\n', html: null })
    await again.close()
    await rm(dir, { recursive: true, force: true })
  })
})
