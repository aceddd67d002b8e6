import { act, cleanup } from '@testing-library/react'
import { beforeEach, expect, test, vi } from 'vitest'
import { useStream } from '../../../src/hooks/use-stream'
import { show } from '../support/show'

class FakeSource extends EventTarget {
  static readonly CLOSED = 2
  static all: FakeSource[] = []
  readyState = 1

  constructor(readonly address: string) {
    super()
    FakeSource.all.push(this)
  }

  close() {
    this.readyState = FakeSource.CLOSED
  }

  say(data: unknown) {
    this.dispatchEvent(new MessageEvent('change', { data: JSON.stringify(data) }))
  }

  fail() {
    this.readyState = FakeSource.CLOSED
    this.dispatchEvent(new Event('error'))
  }
}

function Listener() {
  useStream()
  return null
}

function listen() {
  const client = show(<Listener />)
  const old = vi.spyOn(client, 'invalidateQueries')
  return () => old.mock.calls.map(([filters]) => filters?.queryKey?.[0])
}

const latest = () => FakeSource.all.at(-1)

beforeEach(() => {
  FakeSource.all = []
  vi.useFakeTimers()
  vi.stubGlobal('EventSource', FakeSource)
  return () => vi.useRealTimers()
})

test('what changed on the server makes the queries of that topic old, each once however many changes came', async () => {
  const made = listen()
  latest()?.say({ topic: 'alerts', id: 41 })
  latest()?.say({ topic: 'alerts', id: 42 })
  await act(() => vi.advanceTimersByTimeAsync(200))
  expect(made()).toEqual(['alerts', 'today', 'regions'])
})

test('while changes keep coming pages ask again every other second, of one region only what is its own', async () => {
  const client = show(<Listener />)
  const old = vi.spyOn(client, 'invalidateQueries')
  for (let tenth = 0; tenth < 40; tenth++) {
    latest()?.say({ topic: 'regions', id: 7 })
    await act(() => vi.advanceTimersByTimeAsync(100))
  }
  const asked = old.mock.calls.map(([filters]) => [...(filters?.queryKey ?? []), ...(filters?.exact ? ['alone'] : [])].join(' '))
  expect(asked).toEqual([...['regions alone', 'regions 7', 'today'], ...['regions alone', 'regions 7', 'today']])
})

test('a message nobody agreed on changes nothing', async () => {
  const made = listen()
  latest()?.say({ topic: 'weather' })
  await act(() => vi.advanceTimersByTimeAsync(200))
  expect(made()).toEqual([])
})

test('a stream refused for an ended session opens again when the session is renewed', async () => {
  vi.stubGlobal('fetch', () => Promise.resolve(Response.json({ user: {}, expiresAt: '2026-06-11T04:00:00Z' })))
  listen()
  latest()?.fail()
  await act(() => vi.advanceTimersByTimeAsync(1_010))
  expect(FakeSource.all).toHaveLength(2)
  expect(latest()?.readyState).toBe(1)
})

test('a page that is being left asks for no renewal: its answer would be lost, and the next page seem a thief', async () => {
  const fetched = vi.fn(() => Promise.resolve(Response.json({ user: {}, expiresAt: '2026-06-11T04:00:00Z' })))
  vi.stubGlobal('fetch', fetched)
  listen()
  latest()?.fail()
  await act(() => vi.advanceTimersByTimeAsync(200))
  cleanup()
  await vi.advanceTimersByTimeAsync(5_000)
  expect(fetched).not.toHaveBeenCalled()
})

test('while the stream is down everything is asked again each half minute', async () => {
  vi.stubGlobal('fetch', () => Promise.reject(new Error('offline')))
  const made = listen()
  latest()?.fail()
  await act(() => vi.advanceTimersByTimeAsync(30_300))
  expect(made()).toContain('alerts')
  expect(made()).toContain('letters')
})
