import { EventEmitter } from 'node:events'

export type Topic = 'alerts' | 'regions' | 'files' | 'jobs' | 'feeds' | 'letters'
export interface Change {
  topic: Topic
  id?: number
}

/** What changed, told after the commit to whoever listens (the stream of every open page). */
export interface News {
  tell(...changes: Change[]): void
  listen(listener: (change: Change) => void): () => void
}

export function createNews(): News {
  const emitter = new EventEmitter()
  emitter.setMaxListeners(0)
  return {
    tell: (...changes) => changes.forEach((change) => emitter.emit('change', change)),
    listen: (listener) => {
      emitter.on('change', listener)
      return () => emitter.off('change', listener)
    },
  }
}
