import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { counts } from '../queries/counts'
import { softwareVersion } from '../software-version'
import { serve } from './serve'

const lateTickMs = 5 * 60_000

export function runningRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.health, async ({ now, res }) => {
    const { jobsWaiting, lettersWaiting } = await counts(context)
    const late = context.lastTickAt !== null && now - context.lastTickAt > lateTickMs
    const lettersStuck = context.env.smtpUrl === null && lettersWaiting > 0
    const status = late || lettersStuck ? ('degraded' as const) : ('ok' as const)
    res.set('Cache-Control', 'no-store')
    const lastTickAt = context.lastTickAt === null ? null : new Date(context.lastTickAt).toISOString()
    return { status, version: softwareVersion, now: new Date(now).toISOString(), lastTickAt, jobsWaiting, lettersWaiting }
  })
  serve(router, context, endpoints.metrics, async ({ res }) => {
    const lines = Object.entries(await counts(context)).map(([name, value]) => {
      const metric = `offing_${name.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`)}`
      return `# TYPE ${metric} gauge\n${metric} ${value}\n`
    })
    res.type('text/plain; version=0.0.4').end(lines.join(''))
  })
}
