import { localSolarDay } from '../../shared/science/local-day'
import type { Context } from '../context'
import { keepAlerts } from '../desk/keep-alerts'
import { patchesToTell } from '../desk/patches-to-tell'
import type { JobRecord } from '../models/job'
import { judgeableViews } from '../queries/judgeable-views'
import type { RegionJudgement } from '../workers/tasks'
import { keepBaseline } from './keep-baseline'
import { keepEvents } from './keep-events'
import { keepStanding } from './keep-standing'
import { activeRule } from './active-rule'

/** A job that judges one rule. */
export async function judgeRegionJob(context: Context, job: JobRecord): Promise<'done'> {
  await judgeRegion(context, Number(job.payload['ruleId']))
  return 'done'
}

/**
 * Judges a region by one rule, in one transaction: baseline brought up to date, events, alerts and their letters, and
 * where the region stands. Events are a pure fold of the summaries, so judging again changes nothing.
 */
export async function judgeRegion(context: Context, ruleId: number): Promise<void> {
  const subject = await activeRule(context, ruleId)
  if (!subject || (await isBeingRead(context, subject.geometry.id, subject.feed.id))) return
  const views = await judgeableViews(context, subject.geometry.id, subject.feed.id)
  const nowDay = localSolarDay(context.clock.now(), subject.geometry.centreLongitude)
  const newest = views.reduce((day, view) => Math.max(day, view.day), -Infinity)
  const today = Math.max(nowDay, Math.min(newest, nowDay + 1))
  const found = await context.workers.heavy('judgeRegion', { views, rule: subject.definition, today })
  const judgement = subject.feed.gapFilled ? unsure(found) : found
  const largestPatches = await patchesToTell(context, subject, judgement.events)
  const changes = await context.db.write(async (tx) => {
    const baselineId = await keepBaseline(context, tx, subject, views, judgement)
    const events = await keepEvents(context, tx, subject, judgement.events, baselineId)
    await keepStanding(context, tx, subject, { views, judgement, events, baselineId })
    return keepAlerts(context, tx, subject, { views, judgement, events, baselineId, largestPatches })
  })
  context.news.tell({ topic: 'regions', id: subject.region.id }, ...changes)
}

/**
 * Half a history is no history: an outline, or a feed whose settings or mask changed, is judged when the last of it has been
 * read, which queues judging itself.
 */
async function isBeingRead(context: Context, geometryId: number, feedId: number): Promise<boolean> {
  const newest = (kind: string) => `SELECT max(id) FROM jobs WHERE kind = '${kind}' AND job_key =`
  const reading = await context.db.first(
    `SELECT 1 AS one FROM jobs WHERE state <> 'done' AND (total = 0 OR done < total)
       AND id IN ((${newest('backfill-region')} $geometry), (${newest('backfill-feed')} $feed))`,
    { geometry: String(geometryId), feed: String(feedId) },
  )
  return reading !== undefined
}

/** Where cells may be filled in rather than seen, no view can be judged and nothing may be raised. */
function unsure(judgement: RegionJudgement): RegionJudgement {
  return { ...judgement, events: [], judged: judgement.judged.map((view) => (view.state === 'not-seen' ? view : { ...view, state: 'not-ready' })) }
}
