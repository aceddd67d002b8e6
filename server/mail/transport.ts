import { createTransport } from 'nodemailer'
import type { Context } from '../context'
import type { DueLetter } from '../queries/letters'

export interface MailTransport {
  send(letter: DueLetter): Promise<void>
  close(): void
}

const open = new WeakMap<Context, { url: string; transport: MailTransport }>()

/** The pooled connection to SMTP_URL; null where none is set, and letters wait. */
export function mailTransport(context: Context): MailTransport | null {
  const url = context.env.smtpUrl
  const known = open.get(context)
  if (known && known.url === url) return known.transport
  known?.transport.close()
  open.delete(context)
  if (!url) return null
  const transport = connect(url, context.env.mailFrom)
  open.set(context, { url, transport })
  return transport
}

export function closeTransport(context: Context): void {
  open.get(context)?.transport.close()
  open.delete(context)
}

function connect(url: string, from: string): MailTransport {
  const mailer = createTransport({
    url,
    pool: true,
    maxConnections: 3,
    maxMessages: 100,
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: 30_000,
    disableFileAccess: true,
    disableUrlAccess: true,
  })
  return {
    send: async (letter) => {
      await mailer.sendMail({
        from,
        to: { name: '', address: letter.toAddress },
        subject: letter.subject,
        text: letter.textPart,
        ...(letter.htmlPart ? { html: letter.htmlPart } : {}),
        messageId: letter.messageId,
        ...(letter.inReplyTo ? { inReplyTo: letter.inReplyTo, references: letter.inReplyTo } : {}),
        // When it was written: a letter that waited for a mail server is not newer than what it tells.
        date: new Date(letter.createdAt),
        headers: { 'Auto-Submitted': 'auto-generated' },
      })
    },
    close: () => mailer.close(),
  }
}
