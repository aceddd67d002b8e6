import { cp, mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { freePort, startOffing, type OffingProcess } from './offing-process'

export interface DemoServer {
  baseUrl: string
  /** From the start of the process to the line with the sign-ins. */
  readyAfterMs: number
  /** Passwords by role, as printed for whoever starts the demo. */
  signIns: ReadonlyMap<string, { email: string; password: string }>
  process: OffingProcess
  /** Stops it; answers the exit code. */
  stop(): Promise<number | null>
}

/** Starts the demo on a data folder and waits until it has printed how to get in. */
export async function startDemoServer(dataDir: string, withinMs: number, env: Record<string, string> = {}): Promise<DemoServer> {
  const port = await freePort()
  const began = performance.now()
  const offing = startOffing('demo', { PORT: String(port), DATA_DIR: dataDir, LOG_LEVEL: 'warn', ...env })
  try {
    await offing.until(/Letters are caught here: \S+/, withinMs)
  } catch (error) {
    await offing.kill()
    throw error
  }
  return {
    baseUrl: `http://localhost:${port}`,
    readyAfterMs: performance.now() - began,
    signIns: signInsOf(offing.printed()),
    process: offing,
    stop: offing.stop,
  }
}

function signInsOf(printed: string): DemoServer['signIns'] {
  const lines = [...printed.matchAll(/^ {2}(\w+) +(\S+@\S+) +(\S+)$/gm)]
  return new Map(lines.map(([, role = '', email = '', password = '']) => [role, { email, password }]))
}

export interface OwnDemo extends DemoServer {
  dataDir: string
}

/**
 * A demo of one's own on a copy of the seeded folder: ready in seconds, and the layer of its "today" arrives 20 seconds
 * after the start, however long ago the scenario was made. `stop` also removes the copy.
 */
export async function startOwnDemo(seededDir: string, env: Record<string, string> = {}): Promise<OwnDemo> {
  const dataDir = await mkdtemp(join(tmpdir(), 'offing-demo-'))
  await cp(seededDir, dataDir, { recursive: true })
  const server = await startDemoServer(dataDir, 60_000, env)
  return {
    ...server,
    dataDir,
    stop: async () => {
      const code = await server.stop()
      await rm(dataDir, { recursive: true, force: true })
      return code
    },
  }
}
