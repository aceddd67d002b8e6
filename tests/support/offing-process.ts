import { spawn, type ChildProcess } from 'node:child_process'
import { once } from 'node:events'
import { createServer, type AddressInfo } from 'node:net'
import { fileURLToPath } from 'node:url'
import type { Mode } from '../../server/env'

const root = fileURLToPath(new URL('../..', import.meta.url))

/** A port nobody listens on now. */
export async function freePort(): Promise<number> {
  const server = createServer()
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve))
  const { port } = server.address() as AddressInfo
  await new Promise((resolve) => server.close(resolve))
  return port
}

export interface OffingProcess {
  child: ChildProcess
  /** All it printed so far, both streams. */
  printed(): string
  /** Resolves with the match once it is printed; rejects when the process ends or the time is over before. */
  until(words: RegExp, withinMs: number): Promise<RegExpExecArray>
  /** Resolves when it has ended by itself or by a signal. */
  ended: Promise<{ code: number | null; signal: string | null }>
  /** Asks it to stop, as a service manager does; answers its exit code. */
  stop(): Promise<number | null>
  /** Pulls the plug. */
  kill(): Promise<void>
}

/** Starts the built server as a process of its own. It sees only the environment given here, not the test run's. */
export function startOffing(mode: Exclude<Mode, 'test'>, env: Record<string, string>): OffingProcess {
  const script = `const { main } = await import('./dist/server/main.js'); await main('${mode}')`
  return watched(spawn(process.execPath, ['--input-type=module', '-e', script], { cwd: root, env, stdio: ['ignore', 'pipe', 'pipe'] }))
}

/** Runs a file of this project, built or TypeScript, as a process of its own. */
export function startScript(file: string, args: readonly string[], env: Record<string, string>, input?: string): OffingProcess {
  const loader = file.endsWith('.ts') ? ['--import', 'tsx'] : []
  const child = spawn(process.execPath, [...loader, file, ...args], { cwd: root, env, stdio: ['pipe', 'pipe', 'pipe'] })
  child.stdin.end(input)
  return watched(child)
}

const stopWithinMs = 20_000

function watched(child: ChildProcess): OffingProcess {
  // A test that fails on its way must leave nothing running.
  const endWithTests = () => child.kill('SIGKILL')
  process.once('exit', endWithTests)
  child.once('exit', () => process.off('exit', endWithTests))
  let text = ''
  const onText = new Set<() => void>()
  for (const stream of [child.stdout, child.stderr]) {
    stream?.setEncoding('utf8').on('data', (part: string) => {
      text += part
      onText.forEach((look) => look())
    })
  }
  // 'close' comes after the last output has been read, 'exit' may come before.
  const ended = once(child, 'close').then(([code, signal]) => ({ code: code as number | null, signal: signal as string | null }))
  const kill = async () => {
    child.kill('SIGKILL')
    await ended
  }
  return {
    child,
    printed: () => text,
    ended,
    until: (words, withinMs) =>
      new Promise((resolve, reject) => {
        const over = setTimeout(() => fail(`did not print ${words} within ${withinMs} ms`), withinMs)
        const done = () => {
          clearTimeout(over)
          onText.delete(look)
        }
        const fail = (what: string) => {
          done()
          reject(new Error(`The process ${what}. It printed:\n${text}`))
        }
        const look = () => {
          const found = words.exec(text)
          if (!found) return
          done()
          resolve(found)
        }
        onText.add(look)
        look()
        void ended.then(({ code, signal }) => fail(`ended (${code ?? signal}) before it printed ${words}`))
      }),
    stop: async () => {
      child.kill('SIGTERM')
      const late = setTimeout(() => child.kill('SIGKILL'), stopWithinMs)
      const { code } = await ended
      clearTimeout(late)
      return code
    },
    kill,
  }
}
