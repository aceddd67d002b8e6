import type { AddressInfo } from 'node:net'
import { simpleParser, type AddressObject } from 'mailparser'
import { SMTPServer, type SMTPServerDataStream } from 'smtp-server'
import type { CaughtLetter } from '../../shared/schemas/duty'
import type { Clock } from '../clock'
import { openCaughtStore } from './caught-store'

/** A local SMTP server that keeps what it is given and sends nothing on: for the demo, development and tests. */
export interface MailCatcher {
  /** smtp://host:port */
  url: string
  /** Newest first. */
  list(): CaughtLetter[]
  get(id: string): CaughtLetter | undefined
  close(): Promise<void>
}

export interface MailCatcherOptions {
  port: number
  host: string
  /** Letters are kept here over a restart. */
  dir: string
  clock: Clock
}

const largestLetterBytes = 25 * 1024 * 1024

export async function startMailCatcher({ port, host, dir, clock }: MailCatcherOptions): Promise<MailCatcher> {
  const store = await openCaughtStore(dir)
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS', 'AUTH'],
    size: largestLetterBytes,
    logger: false,
    onData: (stream, session, done) => {
      const to = session.envelope.rcptTo.map((recipient) => recipient.address)
      read(stream, to, clock)
        .then((letter) => store.add(letter))
        .then(() => done(), done)
    },
  })
  const bound = await listen(server, port, host)
  return {
    url: `smtp://${host}:${bound}`,
    list: store.list,
    get: store.get,
    close: () => new Promise((resolve) => server.close(() => resolve())),
  }
}

function listen(server: SMTPServer, port: number, host: string): Promise<number> {
  return new Promise((resolve, reject) => {
    server.once('error', reject)
    server.listen(port, host, () => {
      server.off('error', reject)
      // A client that breaks off must not end the process.
      server.on('error', () => undefined)
      resolve((server.server.address() as AddressInfo).port)
    })
  })
}

async function read(stream: SMTPServerDataStream, to: string[], clock: Clock): Promise<Omit<CaughtLetter, 'id'>> {
  const mail = await simpleParser(stream)
  if (stream.sizeExceeded) throw Object.assign(new Error('The letter is too large.'), { responseCode: 552 })
  return {
    from: addressText(mail.from),
    to,
    subject: mail.subject ?? '',
    date: (mail.date ?? new Date(clock.system())).toISOString(),
    messageId: mail.messageId ?? '',
    text: mail.text ?? '',
    html: mail.html || null,
  }
}

function addressText(address: AddressObject | undefined): string {
  return address?.text ?? ''
}
