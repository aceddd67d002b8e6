import type { HistoryAct } from '../../shared/schemas/regions'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { steerJob } from '../jobs/steer-job'

const jobActs = { pause: 'pause', 'go-on': 'retry', stop: 'cancel' } as const

/** Pauses or stops the reading of a region's history, or goes on with it from where it stood. What was read stays. */
export async function steerHistory(context: Context, person: Person, regionId: number, act: HistoryAct): Promise<void> {
  const region = await context.models.regions.findByPk(regionId)
  if (!region || region.geometryId === null || region.retiredAt !== null) throw new ApiError('not-found', 'There is no such region.')
  const job = await context.models.jobs.findOne({ where: { kind: 'backfill-region', jobKey: String(region.geometryId) }, order: [['id', 'DESC']] })
  if (!job || job.state === 'done') throw new ApiError('conflict', 'All of its history has been read.')
  await steerJob(context, person, job.id, jobActs[act])
  context.news.tell({ topic: 'regions', id: regionId })
}
