import { expect, test, vi } from 'vitest'
import { ApiError } from '../../../src/api/api-error'
import type { Receipt, Sending } from '../../../src/pages/layers/send-file'
import { makeUploads } from '../../../src/pages/layers/uploads'

const file = (name: string) => new File(['abcd'], name)

/** A wire on which each sending waits until the test lets it go. */
function wire() {
  const going: { sending: Sending; arrive: (id: number) => void; fail: (error: unknown) => void }[] = []
  const send = (sending: Sending) =>
    new Promise<Receipt>((resolve, reject) => {
      sending.signal.addEventListener('abort', () => reject(new DOMException('Stopped', 'AbortError')))
      going.push({ sending, arrive: (id) => resolve({ id, name: sending.file.name, checksum: 'ab', status: 'received' }), fail: reject })
    })
  return { going, send }
}

const settled = () => new Promise((resolve) => setTimeout(resolve))

test('files are sent two at a time, in order, and each says where it can be seen', async () => {
  const { going, send } = wire()
  const received = vi.fn()
  const uploads = makeUploads(send, received)
  uploads.add([file('a.nc'), file('b.nc'), file('c.nc')], {})
  expect(uploads.list().map((one) => one.state)).toEqual(['sending', 'sending', 'queued'])
  going[0]?.arrive(11)
  await settled()
  expect(uploads.list().map((one) => [one.state, one.fileId])).toEqual([['received', 11], ['sending', undefined], ['sending', undefined]])
  expect(received).toHaveBeenCalledTimes(1)
})

test('progress is that of the file, and the fields go with it', () => {
  const { going, send } = wire()
  const uploads = makeUploads(send, () => undefined)
  uploads.add([file('a.tif')], { feedId: 3, observedAt: '2026-06-10T12:00:00Z' })
  going[0]?.sending.onProgress(2)
  expect(uploads.list()[0]).toMatchObject({ sent: 2, bytes: 4 })
  expect(going[0]?.sending.fields).toEqual({ feedId: 3, observedAt: '2026-06-10T12:00:00Z' })
})

test('a broken connection is said, holds nothing else up, and can be tried again', async () => {
  const { going, send } = wire()
  const uploads = makeUploads(send, () => undefined)
  uploads.add([file('a.nc'), file('b.nc'), file('c.nc')], {})
  going[0]?.fail(new ApiError('no-connection', 'The connection broke.'))
  await settled()
  expect(uploads.list().map((one) => one.state)).toEqual(['failed', 'sending', 'sending'])
  expect(uploads.list()[0]?.problem).toBe('The connection broke.')
  uploads.retry(1)
  expect(uploads.list()[0]).toMatchObject({ state: 'queued', problem: undefined })
  going[1]?.arrive(12)
  await settled()
  expect(uploads.list()[0]?.state).toBe('sending')
})

test('a stopped file is stopped, also while it waits, and finished ones can be cleared', async () => {
  const { send } = wire()
  const uploads = makeUploads(send, () => undefined)
  uploads.add([file('a.nc'), file('b.nc'), file('c.nc')], {})
  uploads.stop(3)
  uploads.stop(1)
  await settled()
  expect(uploads.list().map((one) => one.state)).toEqual(['stopped', 'sending', 'stopped'])
  uploads.forget()
  expect(uploads.list().map((one) => one.name)).toEqual(['b.nc'])
})
