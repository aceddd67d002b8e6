import { spawn } from 'node:child_process'
import { watch } from 'node:fs'
import { buildServer } from './build'

/** Server rebuilt and started again on every change; Vite serves the client with reload and passes /api on. */
const script = `const { main } = await import('./dist/server/main.js'); await main('development')`
await buildServer()
let server = start()
let timer: NodeJS.Timeout | undefined

function start() {
  return spawn(process.execPath, ['--input-type=module', '-e', script], { stdio: 'inherit' })
}

async function again(): Promise<void> {
  try {
    await buildServer()
  } catch {
    return
  }
  server.once('exit', () => {
    server = start()
  })
  server.kill('SIGTERM')
}

for (const folder of ['server', 'shared']) {
  watch(folder, { recursive: true }, () => {
    clearTimeout(timer)
    timer = setTimeout(() => void again(), 200)
  })
}
const { createServer } = await import('vite')
const vite = await createServer()
await vite.listen()
vite.printUrls()

for (const signal of ['SIGINT', 'SIGTERM'] as const) {
  process.on(signal, () => {
    server.removeAllListeners('exit')
    server.kill('SIGTERM')
    void vite.close().finally(() => process.exit(0))
  })
}
