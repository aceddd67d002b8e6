import type { Context } from '../context'
import { LayerRefused } from '../grids/layer-refused'
import type { FileRecord } from '../models/file'
import type { JobRecord } from '../models/job'
import type { Seen } from '../workers/inspect-file'
import { markProgress } from '../jobs/queue'
import { addLayers, keepGrids } from './add-layers'
import { deriveFrom, type DerivedShare } from './derive-from'
import { noteQuality } from './feed-reading'
import { ensureFirstRule, regionsWithoutRule } from './first-rule'
import { fitsNoFeed, matchFeeds, type FeedMatch, type Matching } from './match-feeds'
import { proposeFeeds } from './propose-feed'
import { queueJudging } from './queue-judging'
import { refuseFile } from './refuse-file'
import { queueAfterReplacement, settleReplacement } from './replace-file'
import { storedPath } from './stored-files'
import { summariseLayers } from './summarise-layers'

const stepsAtOnce = 62

/**
 * The road of a file: looked at, matched with feeds, its layers and every region's figures committed in batches, then
 * judging queued. Running it again changes nothing.
 */
export async function processFile(context: Context, job: JobRecord): Promise<'done'> {
  const file = await context.models.files.findByPk(Number(job.payload['fileId']))
  if (!file) return 'done'
  await setStatus(context, file, { status: 'processing' })
  try {
    const seen = await context.workers.heavy('inspectFile', { path: storedPath(context.env, file.checksum), fileName: file.name })
    const feeds = await context.models.feeds.findAll({ order: [['id', 'ASC']] })
    const matching = matchFeeds(seen, feeds, file)
    if ('waitingFor' in matching) await letWait(context, file, seen, matching, feeds.map((feed) => feed.name))
    else await takeIn(context, job, file, seen, matching.matches)
  } catch (error) {
    // What another file's bytes are refused for is no fault of this one.
    const others = error instanceof LayerRefused && (error.facts['checksum'] ?? file.checksum) !== file.checksum
    if (!(error instanceof LayerRefused) || others) throw error
    await refuseFile(context, file, error)
  }
  return 'done'
}

async function takeIn(context: Context, job: JobRecord, file: FileRecord, seen: Seen, matches: FeedMatch[]): Promise<void> {
  // Recipes of derived layers name bands by what was understood of the file.
  await setStatus(context, file, { report: { ...seen.report, feeds: [] } })
  const producedAt = seen.report.producedAt === null ? file.modifiedAt : Date.parse(seen.report.producedAt)
  const gridIds = await keepGrids(context, seen.grids)
  const total = matches.reduce((sum, match) => sum + match.steps.length, 0)
  const taken: number[] = []
  let done = 0
  for (const match of matches) {
    for (let from = 0; from < match.steps.length; from += stepsAtOnce) {
      const steps = match.steps.slice(from, from + stepsAtOnce)
      const gridId = gridIds[match.variable.grid]!
      const layerIds = await addLayers(context, { file, match, steps, gridId, processingVersion: seen.processingVersion, producedAt })
      await context.db.write((tx) => settleReplacement(context, tx, file))
      done += steps.length
      taken.push(...layerIds)
      await summariseLayers(context, match.feed.id, layerIds, (tx) => markProgress(context, tx, job, done, total))
      context.news.tell({ topic: 'files', id: file.id })
    }
  }
  const derived = await deriveFrom(context, { layerIds: taken, feedIds: matches.map((match) => match.feed.id) }, (tx) => markProgress(context, tx, job, done, total))
  await finish(context, file, seen, matches, derived)
}

async function finish(context: Context, file: FileRecord, seen: Seen, matches: FeedMatch[], derived: readonly DerivedShare[]): Promise<void> {
  const feeds = [
    ...matches.map(({ feed, variable, steps }) => ({ feedId: feed.id, variable: variable.name, layers: steps.length, ...timeSource(variable, steps) })),
    ...derived.map(({ feed, layers }) => ({ feedId: feed.id, variable: feed.variable, layers })),
  ]
  await context.db.write(async (tx) => {
    await file.update(
      { status: 'processed', processedAt: context.clock.now(), report: { ...seen.report, feeds }, proposal: null, waitingFor: null, refusal: null },
      { transaction: tx },
    )
    await queueAfterReplacement(context, tx, file)
    await noteQuality(context, tx, matches)
    for (const region of await regionsWithoutRule(context, tx)) await ensureFirstRule(context, tx, region)
    for (const { feed } of [...matches, ...derived]) await queueJudging(context, tx, { feedId: feed.id })
  })
  context.news.tell({ topic: 'files', id: file.id }, { topic: 'feeds' }, { topic: 'regions' })
}

/** Said only where the file itself has no time. */
function timeSource({ times }: FeedMatch['variable'], steps: FeedMatch['steps']): { timeFrom?: string } {
  const [first] = steps
  return first && times[first.step]?.observedAt === null ? { timeFrom: first.time.from } : {}
}

async function letWait(context: Context, file: FileRecord, seen: Seen, waiting: Extract<Matching, { waitingFor: string }>, names: string[]): Promise<void> {
  const unknown = file.feedId === null && waiting.missed !== null
  const proposed = unknown ? proposeFeeds(seen, file.name, names) : null
  // The quick look before anything is confirmed is drawn on these.
  const gridIds = await keepGrids(context, seen.grids)
  const variables = seen.report.variables.map((variable, i) => ({ ...variable, gridId: gridIds[seen.variables[i]!.grid]! }))
  await setStatus(context, file, {
    status: 'waiting',
    waitingFor: unknown && !proposed && waiting.waitingFor === fitsNoFeed ? nothingToPropose(seen) : waiting.waitingFor,
    report: { ...seen.report, variables, feeds: [], missed: waiting.missed ?? [], others: proposed?.others ?? [] },
    proposal: proposed?.proposal ?? null,
  })
}

function nothingToPropose({ variables }: Seen): string {
  const own = variables.filter((variable) => !variable.tellsOfAnother)
  if (own.length === 0) return 'It fits no feed, and none is proposed: it holds only the errors, counts or flags of other variables.'
  return `It fits no feed, and none is proposed: of ${own.slice(0, 5).map((variable) => variable.name).join(', ')}${own.length > 5 ? ' and more' : ''} Offing cannot tell which to read. Say which feed it belongs to.`
}

async function setStatus(context: Context, file: FileRecord, change: Parameters<FileRecord['update']>[0]): Promise<void> {
  await context.db.write((tx) => file.update(change, { transaction: tx }))
  context.news.tell({ topic: 'files', id: file.id })
}
