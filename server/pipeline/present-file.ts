import { dateOf } from '../../shared/science/local-day'
import type { FileItem, OffingFile, ReportVariable } from '../../shared/schemas/files'
import type { Context } from '../context'
import type { FileRecord } from '../models/file'
import { activeGeometries } from '../queries/geometries'
import { boxesMeet } from './summarise-layers'
import { replacersOf } from '../queries/replacements'

const iso = (instant: number | null) => (instant === null ? null : new Date(instant).toISOString())

export async function presentFiles(context: Context, files: readonly FileRecord[]): Promise<FileItem[]> {
  const people = new Map(
    (await context.models.users.findAll({ attributes: ['id', 'name'], where: { id: files.flatMap((file) => file.uploadedBy ?? []) } })).map((user) => [user.id, user.name]),
  )
  const running = await context.db.all<{ fileId: string; done: number; total: number }>(
    `SELECT job_key AS fileId, done, total FROM jobs WHERE kind = 'process-file' AND state = 'running'`,
  )
  const progress = new Map(running.map((job) => [Number(job.fileId), { done: job.done, total: job.total }]))
  return files.map((file) => ({
    id: file.id,
    name: file.name,
    checksum: file.checksum,
    bytes: file.bytes,
    status: file.status,
    origin: file.origin,
    uploadedBy: file.uploadedBy === null ? null : { id: file.uploadedBy, name: people.get(file.uploadedBy) ?? '' },
    receivedAt: iso(file.receivedAt)!,
    processedAt: iso(file.processedAt),
    feedId: file.feedId,
    observedAt: iso(file.observedAt),
    refusal: file.refusal,
    waitingFor: file.waitingFor,
    progress: file.status === 'processing' ? (progress.get(file.id) ?? null) : null,
  }))
}

/** One file with what was understood, its layers in time order and the figures it gave. */
export async function presentFile(context: Context, file: FileRecord): Promise<OffingFile> {
  const [item] = await presentFiles(context, [file])
  const layers = await context.db.all<{ id: number; feedId: number; observedAt: number; replaced: number }>(
    `SELECT l.id, l.feed_id AS feedId, l.observed_at AS observedAt, l.replaced_by IS NOT NULL AS replaced FROM layers l JOIN feeds f ON f.id = l.feed_id
     WHERE l.file_id = $id OR (l.checksum = $checksum AND l.feed_id = $feedId AND l.observed_at = $observedAt)
     ORDER BY l.observed_at, f.derived_from IS NOT NULL, l.id`,
    { id: file.id, checksum: file.checksum, feedId: file.feedId ?? -1, observedAt: file.observedAt ?? -1 },
  )
  const summaries = await context.db.all<{
    regionId: number
    regionName: string
    feedId: number
    day: number
    coverage: number | null
    median: number | null
    geometricMean: number | null
  }>(
    `SELECT r.id AS regionId, r.name AS regionName, s.feed_id AS feedId, s.day, s.coverage, s.median, s.geometric_mean AS geometricMean
     FROM layers l JOIN view_layers v ON v.layer_id = l.id
       JOIN summaries s ON s.geometry_id = v.geometry_id AND s.feed_id = v.feed_id AND s.day = v.day
       JOIN regions r ON r.geometry_id = s.geometry_id AND r.retired_at IS NULL
     WHERE l.file_id = $id ORDER BY s.day DESC, r.name, s.feed_id LIMIT 200`,
    { id: file.id },
  )
  return {
    ...item!,
    report: file.report && { ...file.report, variables: await withMasked(context, file) },
    proposal: file.proposal,
    others: file.proposal === null ? [] : (file.report?.others ?? []),
    wouldGive: await wouldGive(context, file),
    layers: layers.map((layer) => ({ ...layer, observedAt: iso(layer.observedAt)!, replaced: layer.replaced === 1 })),
    replaces: file.replaces === null ? null : ((await context.models.files.findByPk(file.replaces, { attributes: ['id', 'name'] }))?.get({ plain: true }) ?? null),
    replacedBy: (await replacersOf(context, file.id)).map((newer) => ({ ...newer, at: iso(newer.at)! })),
    summaries: summaries.map((row) => ({ ...row, day: dateOf(row.day) })),
  }
}

/** The regions that the proposed variable's grid meets, by their boxes as a layer would be. */
async function wouldGive(context: Context, { proposal, report }: FileRecord): Promise<OffingFile['wouldGive']> {
  const variable = proposal && report?.variables.find((one) => one.name === proposal.variable)
  if (!variable) return null
  const outlines = await activeGeometries(context)
  const met = outlines.filter((outline) => boxesMeet(outline, variable.grid)).map((outline) => outline.regionId)
  const regions = await context.models.regions.findAll({ attributes: ['id', 'name'], where: { id: met }, order: [['name', 'ASC']] })
  return { regions: regions.map(({ id, name }) => ({ id, name })), ofRegions: outlines.length }
}

/** Which flagged cells are hidden: by the feeds that read the variable, or by the proposal while the file waits for one. */
async function withMasked(context: Context, file: FileRecord): Promise<ReportVariable[]> {
  const { variables = [], feeds = [] } = file.report ?? {}
  const records = await context.models.feeds.findAll({ where: { id: feeds.map((one) => one.feedId) } })
  return variables.map((variable) => {
    const own = feeds.filter((one) => one.variable === variable.name).map((one) => one.feedId)
    const byFeeds = records.filter((record) => own.includes(record.id)).flatMap((record) => record.hiddenFlags)
    const proposed = [...(file.proposal ? [file.proposal] : []), ...(file.report?.others ?? [])].filter((one) => file.proposal !== null && one.variable === variable.name)
    const hidden = new Set([...byFeeds, ...proposed.flatMap((one) => one.hiddenFlags)])
    const masked = (variable.flags ?? []).filter((flag) => hidden.has(flag.meaning)).map(({ meaning, cells }) => ({ reason: meaning, cells }))
    return { ...variable, masked }
  })
}
