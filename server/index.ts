import { fileURLToPath } from 'node:url'
import { EnvNotValid, readEnv, type Mode } from './env'
import { settingOf } from './queries/settings'
import { startDemo } from './seeders/demo/start-demo'
import { CannotStart, serveOffing, type Serving } from './serve-offing'

const beside = (path: string) => fileURLToPath(new URL(path, import.meta.url))

/** Starts Offing in the given mode; the bundle's only door. Ends the process with a sentence when it can't. */
export async function main(mode: Exclude<Mode, 'test'>): Promise<void> {
  try {
    const env = readEnv(mode)
    const serving = await serveOffing(env, { clientDir: beside('../client'), workerBundle: beside('./worker.js') })
    stopWithProcess(serving)
    if (mode === 'demo') return await startDemo(serving)
    if (mode === 'production' && (await settingOf(serving.context.db, 'demo')) !== null) {
      await serving.stop()
      throw new CannotStart(`${env.dataDir} holds the demo, whose passwords anyone can read. Set DATA_DIR to another folder.`)
    }
    await serving.listen()
    console.log(`Offing answers at ${env.baseUrl}`)
    if (serving.context.env.smtpUrl === null) console.log('SMTP_URL is not set: letters wait in the outbox until it is.')
  } catch (error) {
    console.error(error instanceof EnvNotValid || error instanceof CannotStart ? error.message : error)
    process.exit(1)
  }
}

function stopWithProcess(serving: Serving): void {
  let stopping = false
  const stop = () => {
    if (stopping) process.exit(1)
    stopping = true
    serving.stop().then(
      () => process.exit(0),
      (error: unknown) => {
        console.error(error)
        process.exit(1)
      },
    )
  }
  process.on('SIGINT', stop)
  process.on('SIGTERM', stop)
}
