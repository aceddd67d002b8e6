import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { presentJob } from '../jobs/present-job'
import { steerJob } from '../jobs/steer-job'
import { rowsBefore } from '../queries/rows-after'
import { cursorId, fromNewest, pageOf } from './paging'
import { serve } from './serve'

export function jobRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.listJobs, async ({ query: { limit, cursor, state } }) => {
    const { items, nextCursor } = pageOf(await rowsBefore(context.models.jobs, cursorId(cursor, fromNewest), limit + 1, state ? { state } : {}), limit)
    return { items: items.map(presentJob), nextCursor }
  })
  serve(router, context, endpoints.retryJob, async ({ person, params }) => presentJob(await steerJob(context, person, params.id, 'retry')))
  serve(router, context, endpoints.pauseJob, async ({ person, params }) => presentJob(await steerJob(context, person, params.id, 'pause')))
  serve(router, context, endpoints.cancelJob, async ({ person, params }) => presentJob(await steerJob(context, person, params.id, 'cancel')))
}
