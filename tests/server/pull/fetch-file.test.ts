import { randomBytes } from 'node:crypto'
import { readFile, readdir } from 'node:fs/promises'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { fetchFile, type Fetched, type FileAsked } from '../../../server/pull/fetch-file'
import { createGate, type Gate } from '../../../server/pull/gate'
import { useNetwork, usualLimits, type Network } from '../../../server/pull/network'
import { createTestContext, type TestContext } from '../../support/test-context'
import { cutAfter, etagOf, sendFile, startProvider, type Provider } from '../../support/provider'

let context: TestContext
let provider: Provider
const now = Date.parse('2026-06-11T15:00:00Z')
const bytes = randomBytes(400_000)

beforeEach(async () => {
  context = await createTestContext({ at: new Date(now) })
  provider = await startProvider()
})
afterEach(async () => {
  await provider.close()
  await context.close()
})

const open = () => useNetwork(context, { gate: createGate({ allowPrivate: true }) })

function fetch(network: Network, path: string, wish: Partial<FileAsked> = {}): Promise<Fetched> {
  const url = new URL(path, provider.url)
  return fetchFile(context.env, network, { url, authorization: null, known: null, now, mayAsk: async () => undefined, ...wish })
}

async function bytesOf(fetched: Fetched): Promise<Buffer> {
  if (fetched.kind !== 'fetched') throw new Error(`nothing was fetched: ${fetched.kind}`)
  return readFile(fetched.arrived.temporary)
}

const leftBehind = () => readdir(join(context.env.dataDir, 'files', 'arriving'))

/** Knows one name that stands for the local provider, and refuses like the real gate in everything else. */
function gateWithProvider(): Gate {
  const real = createGate({ allowPrivate: false, resolve: async () => [{ address: '93.184.216.34', family: 4 }] })
  const isProvider = (url: URL) => url.hostname === 'provider.test'
  return {
    check: (url) => (isProvider(url) ? undefined : real.check(url)),
    admit: async (url) => (isProvider(url) ? [{ address: '127.0.0.1', family: 4 }] : real.admit(url)),
  }
}

describe('fetching a file', () => {
  it('says who asks, and takes the bytes with their checksum', async () => {
    provider.put('/a.nc', bytes)
    const fetched = await fetch(open(), '/a.nc')
    expect((await bytesOf(fetched)).equals(bytes)).toBe(true)
    expect(fetched).toMatchObject({ arrived: { bytes: bytes.length }, validators: { etag: etagOf(bytes) } })
    expect(provider.calls[0]!.headers['user-agent']).toMatch(/^Offing\/\d+\.\d+\.\d+$/)
  })

  it('asks only for what changed since the last time', async () => {
    provider.put('/a.nc', bytes)
    expect(await fetch(open(), '/a.nc', { known: { etag: etagOf(bytes), lastModified: 'Wed, 10 Jun 2026 00:00:00 GMT' } })).toEqual({ kind: 'unchanged' })
    expect(provider.calls[0]!.headers).toMatchObject({ 'if-none-match': etagOf(bytes), 'if-modified-since': 'Wed, 10 Jun 2026 00:00:00 GMT' })
    expect(await leftBehind()).toEqual([])
  })

  it('takes a 404, a 410 and an empty file as not there yet', async () => {
    provider.put('/gone.nc', (response) => response.writeHead(410).end())
    provider.put('/empty.nc', Buffer.alloc(0))
    for (const path of ['/none.nc', '/gone.nc', '/empty.nc']) expect(await fetch(open(), path)).toEqual({ kind: 'not-there' })
    expect(await leftBehind()).toEqual([])
  })

  it('goes on where a cut connection left it, if the file is still the same', async () => {
    let times = 0
    provider.put('/a.nc', (response, request) => (++times === 1 ? cutAfter(bytes, 150_000)(response, request) : sendFile(bytes, request, response)))
    const fetched = await fetch(open(), '/a.nc')
    expect((await bytesOf(fetched)).equals(bytes)).toBe(true)
    expect(times).toBe(2)
    const { range, 'if-range': ifRange } = provider.calls[1]!.headers
    expect(Number(/^bytes=(\d+)-$/.exec(range!)![1])).toBeGreaterThan(0)
    expect(ifRange).toBe(etagOf(bytes))
  })

  it('begins anew when the file has changed in between', async () => {
    const newer = randomBytes(300_000)
    let times = 0
    provider.put('/a.nc', (response, request) => (++times === 1 ? cutAfter(bytes, 150_000)(response, request) : sendFile(newer, request, response)))
    expect((await bytesOf(await fetch(open(), '/a.nc'))).equals(newer)).toBe(true)
  })

  it('never joins parts that a server cannot vouch for', async () => {
    let times = 0
    const weak = { etag: 'W/"a"', 'last-modified': 'Wed, 10 Jun 2026 00:00:00 GMT' }
    provider.put('/a.nc', (response, request) => (++times === 1 ? cutAfter(bytes, 150_000, weak)(response, request) : sendFile(bytes, request, response)))
    expect((await bytesOf(await fetch(open(), '/a.nc'))).equals(bytes)).toBe(true)
    expect(provider.calls[1]!.headers.range).toBeUndefined()
  })

  it('begins anew when the part that comes is not the part it asked for', async () => {
    let times = 0
    provider.put('/a.nc', (response, request) => {
      times += 1
      if (times === 1) return cutAfter(bytes, 150_000)(response, request)
      if (times > 2) return sendFile(bytes, request, response)
      return void response.writeHead(206, { 'content-range': `bytes 7-${bytes.length - 1}/${bytes.length}` }).end(bytes.subarray(7))
    })
    expect((await bytesOf(await fetch(open(), '/a.nc'))).equals(bytes)).toBe(true)
    expect(times).toBe(3)
  })

  it('gives up on a line that is cut every time, and leaves nothing behind', async () => {
    provider.put('/a.nc', cutAfter(bytes, 0))
    await expect(fetch(open(), '/a.nc')).rejects.toThrow(/the connection was cut 3 times/)
    expect(await leftBehind()).toEqual([])
  })

  it('refuses a file that is too large by its head, and one that turns out so on the way', async () => {
    context.env.maxUploadBytes = 200_000
    provider.put('/said.nc', (response) => response.writeHead(200, { 'content-length': bytes.length }).end(bytes))
    provider.put('/unsaid.nc', (response) => void response.writeHead(200).end(bytes))
    let written = 0
    provider.put('/endless.nc', (response) => {
      const more = () => response.write(bytes, () => (written += bytes.length) && !response.destroyed && more())
      more()
    })
    for (const path of ['/said.nc', '/unsaid.nc', '/endless.nc']) await expect(fetch(open(), path)).rejects.toThrow(/larger than/)
    expect(written).toBeLessThan(100_000_000)
    expect(await leftBehind()).toEqual([])
  })

  it('waits only so long for an answer, and only so long for the next byte', async () => {
    const network = useNetwork(context, { gate: createGate({ allowPrivate: true }), limits: { ...usualLimits, headersMs: 40, idleMs: 40 } })
    provider.put('/silent.nc', () => undefined)
    provider.put('/stuck.nc', (response) => void response.writeHead(200, { 'content-length': bytes.length }).write(bytes.subarray(0, 10)))
    await expect(fetch(network, '/silent.nc')).rejects.toThrow(/does not answer in time/)
    await expect(fetch(network, '/stuck.nc')).rejects.toThrow(/the connection was cut \d+ times, last after 10 bytes/)
  })

  it('ends a trickle that would never be done', async () => {
    const network = useNetwork(context, { gate: createGate({ allowPrivate: true }), limits: { ...usualLimits, wholeMs: 60 } })
    provider.put('/trickle.nc', (response) => {
      response.writeHead(200)
      const timer = setInterval(() => response.write('x'), 5)
      response.once('close', () => clearInterval(timer))
    })
    await expect(fetch(network, '/trickle.nc')).rejects.toThrow(/the connection was cut/)
  })

  it('follows where it is sent on, five times at most', async () => {
    for (let hop = 0; hop < 7; hop++) provider.put(`/${hop}`, (response) => response.writeHead(302, { location: `/${hop + 1}` }).end())
    provider.put('/5', bytes)
    expect((await bytesOf(await fetch(open(), '/0'))).equals(bytes)).toBe(true)
    provider.put('/5', (response) => response.writeHead(302, { location: '/6' }).end())
    await expect(fetch(open(), '/0')).rejects.toThrow(/more than 5 times/)
  })

  it('is not sent on to a private network, whatever the first server says', async () => {
    const inside = await startProvider()
    inside.put('/secret', Buffer.from('inside'))
    const network = useNetwork(context, { gate: gateWithProvider() })
    const url = new URL(`http://provider.test:${provider.port}/a.nc`)
    for (const location of [`https://127.0.0.1:${inside.port}/secret`, 'https://169.254.169.254/latest', 'https://[::1]/', `http://example.org/`]) {
      provider.put('/a.nc', (response) => response.writeHead(302, { location }).end())
      await expect(fetch(network, '', { url })).rejects.toThrow(/private or special network|Only https/)
    }
    expect(inside.calls).toEqual([])
    await inside.close()
  })

  it('gives credentials to the server they are for, and to no other', async () => {
    const other = await startProvider()
    other.put('/a.nc', bytes)
    provider.put('/here', (response) => response.writeHead(302, { location: '/there' }).end())
    provider.put('/there', (response) => response.writeHead(302, { location: `${other.url}/a.nc` }).end())
    await fetch(open(), '/here', { authorization: 'Bearer of-the-provider' })
    expect(provider.calls.map((call) => call.headers.authorization)).toEqual(['Bearer of-the-provider', 'Bearer of-the-provider'])
    expect(other.calls.map((call) => call.headers.authorization)).toEqual([undefined])
    await other.close()
  })

  it('connects to the address that was checked, not to what a name stands for later', async () => {
    provider.put('/a.nc', bytes)
    const asked: string[] = []
    const gate: Gate = { check: () => undefined, admit: async (url) => (asked.push(url.hostname), [{ address: '127.0.0.1', family: 4 }]) }
    // Nobody but the gate knows this name: a second look-up would fail.
    const url = new URL(`http://no-such-name.invalid:${provider.port}/a.nc`)
    expect((await bytesOf(await fetch(useNetwork(context, { gate }), '', { url }))).equals(bytes)).toBe(true)
    expect(asked).toEqual(['no-such-name.invalid'])
    expect(provider.calls[0]!.headers.host).toBe(`no-such-name.invalid:${provider.port}`)
  })

  it('asks one host one thing at a time, until the last byte', async () => {
    for (let i = 0; i < 6; i++) provider.put(`/${i}`, bytes)
    const network = open()
    await Promise.all(Array.from({ length: 6 }, (_, i) => fetch(network, `/${i}`)))
    expect(provider.calls.map((call) => call.together)).toEqual([1, 1, 1, 1, 1, 1])
  })

  it('says in a sentence what a server answers instead', async () => {
    const cases: [number, RegExp, object][] = [
      [401, /does not accept the credentials/, { lasting: true, endsRun: true }],
      [403, /does not allow/, { lasting: true, endsRun: true }],
      [500, /answers with status 500/, { lasting: false, endsRun: false }],
      [429, /asked too often/, { rest: { host: `127.0.0.1:${provider.port}`, until: now + 120_000 } }],
      [503, /out of service/, { rest: { host: `127.0.0.1:${provider.port}`, until: now + 120_000 } }],
    ]
    for (const [status, words, facts] of cases) {
      provider.put('/a.nc', (response) => response.writeHead(status, { 'retry-after': '120' }).end())
      const failure = await fetch(open(), '/a.nc').catch((error: unknown) => error)
      expect(failure).toMatchObject({ name: 'PullFailed', message: expect.stringMatching(words), ...facts })
    }
    provider.put('/a.nc', (response) => response.writeHead(200, { 'content-type': 'text/html; charset=utf-8' }).end('<html>Sign in</html>'))
    await expect(fetch(open(), '/a.nc')).rejects.toThrow(/a page instead of a file/)
    await provider.close()
    await expect(fetch(open(), '/a.nc')).rejects.toThrow(/takes no connection/)
    provider = await startProvider()
  })

  it('stops at once when Offing stops', async () => {
    const network = open()
    provider.put('/silent.nc', () => network.stopping.abort())
    await expect(fetch(network, '/silent.nc')).rejects.toMatchObject({ name: 'PullStopped' })
    expect(await leftBehind()).toEqual([])
  })
})
