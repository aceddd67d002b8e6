import type { Server } from 'node:http'
import type { AddressInfo } from 'node:net'
import { join } from 'node:path'
import { createApp } from './app'
import type { Context } from './context'
import type { Env } from './env'
import { takeInstanceLock } from './instance-lock'
import { startTicker, type Ticker } from './jobs/ticker'
import { voidLeases } from './jobs/void-leases'
import { startMailCatcher } from './mail/catcher'
import { stopDelivery } from './mail/delivery'
import { openContext } from './open-context'
import { clearArriving } from './pipeline/stored-files'
import { startWorkers } from './workers/workers'

export class CannotStart extends Error {
  override name = 'CannotStart'
}

export interface Serving {
  context: Context
  ticker: Ticker
  /** Starts answering; gives the port. Until then only the queue runs. */
  listen(): Promise<number>
  stop(): Promise<void>
}

/** One process: database, workers, ticker and the HTTP server. */
export async function serveOffing(env: Env, { clientDir, workerBundle }: { clientDir: string; workerBundle: string }): Promise<Serving> {
  const lock = await takeInstanceLock(env.dataDir)
  if (!lock) throw new CannotStart(`Another Offing already serves ${env.dataDir}. Stop it, or set DATA_DIR to another folder.`)
  await clearArriving(env)
  const catchesMail = env.mode === 'demo' || (env.mode === 'development' && env.smtpUrl === null)
  const context = await openContext({
    env,
    workers: startWorkers(workerBundle),
    startCatcher: catchesMail ? ({ clock }) => startMailCatcher({ port: 0, host: '127.0.0.1', dir: join(env.dataDir, 'caught'), clock }) : undefined,
  })
  if (context.mailCatcher) context.env = { ...env, smtpUrl: context.mailCatcher.url }
  await voidLeases(context)
  const ticker = startTicker(context, { cron: true })
  context.wake = ticker.wake
  let server: Server | null = null
  return {
    context,
    ticker,
    listen: async () => {
      server = await listening(context, clientDir)
      return (server.address() as AddressInfo).port
    },
    stop: async () => {
      server?.closeAllConnections()
      server?.close()
      await ticker.stop()
      await stopDelivery(context)
      await context.mailCatcher?.close()
      await context.workers.close()
      await context.db.close()
      await lock.release()
    },
  }
}

/** Express 5 hands a failed start to the same callback as a good one. */
function listening(context: Context, clientDir: string): Promise<Server> {
  const { port, host } = context.env
  return new Promise((resolve, reject) => {
    const server = createApp(context, { clientDir }).listen(port, host, (error?: Error) => {
      if (!error) return resolve(server)
      const taken = 'code' in error && error.code === 'EADDRINUSE'
      reject(taken ? new CannotStart(`Port ${port} is taken. Set PORT to another one.`) : error)
    })
  })
}
