import { createHash } from 'node:crypto'
import { createServer, type IncomingHttpHeaders, type IncomingMessage, type ServerResponse } from 'node:http'
import type { AddressInfo } from 'node:net'

export interface ProviderCall {
  path: string
  headers: IncomingHttpHeaders
  /** Requests under way at this provider when this one came, itself included. */
  together: number
}

type Answer = (response: ServerResponse, request: IncomingMessage) => void

export interface Provider {
  port: number
  url: string
  calls: ProviderCall[]
  /** What lies where; a path nobody put is a 404. Files have an ETag and answer ranges. */
  put(path: string, what: Buffer | Answer): void
  take(path: string): void
  pathsAsked(): string[]
  close(): Promise<void>
}

/** A provider of files on the local machine, as gappy, slow or rude as a test wants. */
export async function startProvider(): Promise<Provider> {
  const files = new Map<string, Buffer | Answer>()
  const calls: ProviderCall[] = []
  let together = 0
  const server = createServer((request, response) => {
    together += 1
    response.once('close', () => (together -= 1))
    const path = request.url ?? ''
    calls.push({ path, headers: request.headers, together })
    const found = files.get(path)
    if (found === undefined) response.writeHead(404).end()
    else if (Buffer.isBuffer(found)) sendFile(found, request, response)
    else found(response, request)
  })
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  const { port } = server.address() as AddressInfo
  return {
    port,
    url: `http://127.0.0.1:${port}`,
    calls,
    put: (path, what) => void files.set(path, what),
    take: (path) => void files.delete(path),
    pathsAsked: () => calls.map((call) => call.path),
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve())
        server.closeAllConnections()
      }),
  }
}

export function etagOf(bytes: Buffer): string {
  return `"${createHash('sha256').update(bytes).digest('hex').slice(0, 16)}"`
}

export function sendFile(bytes: Buffer, request: IncomingMessage, response: ServerResponse): void {
  const etag = etagOf(bytes)
  if (request.headers['if-none-match'] === etag) return void response.writeHead(304, { etag }).end()
  const range = /^bytes=(\d+)-$/.exec(request.headers.range ?? '')
  if (!range || request.headers['if-range'] !== etag) return void response.writeHead(200, { etag, 'content-length': bytes.length }).end(bytes)
  const from = Number(range[1])
  const headers = { etag, 'content-length': bytes.length - from, 'content-range': `bytes ${from}-${bytes.length - 1}/${bytes.length}` }
  response.writeHead(206, headers).end(bytes.subarray(from))
}

/** Sends the head and the first bytes, then cuts the line once they are out. */
export function cutAfter(bytes: Buffer, count: number, headers: Record<string, string> = { etag: etagOf(bytes) }): Answer {
  return (response) => {
    response.writeHead(200, { ...headers, 'content-length': bytes.length })
    response.write(bytes.subarray(0, count), () => response.destroy())
  }
}
