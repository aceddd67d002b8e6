import { sentenceOf } from '../../api/api-error'
import type { Receipt, SendFields, Sending } from './send-file'

export interface Upload {
  key: number
  name: string
  bytes: number
  sent: number
  state: 'queued' | 'sending' | 'received' | 'failed' | 'stopped'
  fileId?: number
  problem?: string
}

export interface Uploads {
  add: (files: readonly File[], fields: SendFields) => void
  retry: (key: number) => void
  stop: (key: number) => void
  forget: () => void
  list: () => readonly Upload[]
  subscribe: (listener: () => void) => () => void
}

interface Kept {
  file: File
  fields: SendFields
  stop?: AbortController
}

const atOnce = 2

/** The queue of files being sent. It stands outside the pages, so turning to another page stops nothing. */
export function makeUploads(send: (sending: Sending) => Promise<Receipt>, onReceived: () => void): Uploads {
  let list: readonly Upload[] = []
  let nextKey = 1
  const kept = new Map<number, Kept>()
  const listeners = new Set<() => void>()

  const change = (next: readonly Upload[]) => {
    list = next
    listeners.forEach((listener) => listener())
  }
  const update = (key: number, part: Partial<Upload>) => change(list.map((one) => (one.key === key ? { ...one, ...part } : one)))

  const begin = () => {
    const sending = list.filter((one) => one.state === 'sending').length
    list.filter((one) => one.state === 'queued').slice(0, atOnce - sending).forEach((one) => void run(one.key))
  }

  const run = async (key: number) => {
    const held = kept.get(key)
    if (!held) return
    const stop = new AbortController()
    held.stop = stop
    update(key, { state: 'sending', sent: 0 })
    try {
      const { file, fields } = held
      const receipt = await send({ file, fields, signal: stop.signal, onProgress: (sent) => update(key, { sent }) })
      kept.delete(key)
      update(key, { state: 'received', sent: file.size, fileId: receipt.id })
      onReceived()
    } catch (error) {
      update(key, stop.signal.aborted ? { state: 'stopped' } : { state: 'failed', problem: sentenceOf(error) })
    }
    begin()
  }

  return {
    add: (files, fields) => {
      const added = files.map((file): Upload => {
        const key = nextKey
        nextKey += 1
        kept.set(key, { file, fields })
        return { key, name: file.name, bytes: file.size, sent: 0, state: 'queued' }
      })
      change([...list, ...added])
      begin()
    },
    retry: (key) => {
      update(key, { state: 'queued', sent: 0, problem: undefined })
      begin()
    },
    stop: (key) => {
      const held = kept.get(key)
      if (held?.stop) held.stop.abort()
      else update(key, { state: 'stopped' })
    },
    forget: () => change(list.filter((one) => one.state === 'queued' || one.state === 'sending')),
    list: () => list,
    subscribe: (listener) => {
      listeners.add(listener)
      return () => listeners.delete(listener)
    },
  }
}
