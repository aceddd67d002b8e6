import type { Tasks } from './tasks'

/** `light` keeps one worker free for tiles, points and passwords while `heavy` reads files. */
export interface Workers {
  light<K extends keyof Tasks>(task: K, input: Tasks[K]['input'], options?: { signal?: AbortSignal }): Promise<Tasks[K]['output']>
  heavy<K extends keyof Tasks>(task: K, input: Tasks[K]['input'], options?: { signal?: AbortSignal }): Promise<Tasks[K]['output']>
  close(): Promise<void>
}
