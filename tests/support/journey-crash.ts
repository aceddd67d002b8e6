import { mkdtemp, readFile, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { endpoints } from '../../shared/schemas/endpoints'
import type { FileItem } from '../../shared/schemas/files'
import { defaultRule } from '../../shared/science/rule'
import { apiWith, type JourneyApi } from './journey-api'
import { daysFrom, writeSurvey } from './journey-files'
import { freePort, startOffing, startScript, type OffingProcess } from './offing-process'

export const secret = '9f0c1d7a5be84e2fb6a3c8d1407e95f2'
const box = { west: -12, south: 50, east: -11.4, north: 50.4 }
const outlines = {
  'North Patch': [[-11.93, 50.22], [-11.52, 50.19], [-11.47, 50.36], [-11.88, 50.34], [-11.93, 50.22]],
  'South Patch': [[-11.83, 50.04], [-11.61, 50.07], [-11.66, 50.17], [-11.83, 50.04]],
}

export interface Sent {
  name: string
  bytes: Uint8Array<ArrayBuffer>
  /** Layers it must give; null: it must be refused. */
  layers: number | null
}

/**
 * Twenty files of one feed up to `today`: sixteen good ones in all three formats, four wrong ones. Only the last two days
 * are above the rule of the regions, so there is one event in each, and it is fresh.
 */
export async function twentyFiles(today: string): Promise<Sent[]> {
  const folder = await mkdtemp(join(tmpdir(), 'offing-twenty-'))
  const plan = [
    ...Array.from({ length: 6 }, () => ({ format: 'netcdf4' as const, days: 90 })),
    ...Array.from({ length: 5 }, () => ({ format: 'geotiff' as const, days: 1 })),
    ...Array.from({ length: 5 }, () => ({ format: 'classic' as const, days: 40 })),
  ]
  const total = plan.reduce((sum, { days }) => sum + days, 0)
  const allDays = daysFrom(dayBefore(today, total - 1), total)
  const good: Sent[] = []
  let from = 0
  for (const { format, days: count } of plan) {
    const first = from
    const days = allDays.slice(first, first + count)
    const value = (day: number) => (first + day >= total - 2 ? 7.5 : 1 + ((first + day) % 17) / 20)
    const name = `survey-${days[0]?.replaceAll('-', '')}.${format === 'geotiff' ? 'tif' : 'nc'}`
    const path = await writeSurvey(folder, name, format, { box, days, value, variable: 'chl_survey' })
    good.push({ name, bytes: new Uint8Array(await readFile(path)), layers: count })
    from += count
  }
  await rm(folder, { recursive: true })
  const cut = (at: number, share: number) => good[at]!.bytes.slice(0, Math.floor(good[at]!.bytes.length * share))
  const wrong: Sent[] = [
    { name: 'survey-text.nc', bytes: new TextEncoder().encode('These are the figures of the survey: 1.2, 1.4, 1.1\n'), layers: null },
    { name: 'survey-empty.nc', bytes: new Uint8Array(0), layers: null },
    { name: 'survey-cut-netcdf4.nc', bytes: cut(0, 0.6), layers: null },
    { name: 'survey-cut-classic.nc', bytes: cut(good.length - 1, 0.7), layers: null },
  ]
  // Wrong ones stand among the good ones, so that the queue meets them on its way.
  return good.flatMap((file, at) => (at % 4 === 1 ? [file, wrong[(at - 1) / 4]!] : [file]))
}

function dayBefore(day: string, days: number): string {
  return new Date(Date.parse(`${day}T00:00:00Z`) - days * 86_400_000).toISOString().slice(0, 10)
}

export interface Station {
  dataDir: string
  api: JourneyApi
  feedId: number
  regionIds: number[]
  offing: () => OffingProcess
  /** Starts it again on the same folder and port, as a service manager would. */
  restart(): Promise<void>
  remove(): Promise<void>
}

/** Offing in production form on a folder of its own, with an admin, a feed, two regions and a rule for each. */
export async function aStation(): Promise<Station> {
  const dataDir = await mkdtemp(join(tmpdir(), 'offing-station-'))
  const env = { DATA_DIR: dataDir, PORT: String(await freePort()), SESSION_SECRET: secret, LOG_LEVEL: 'warn' }
  await command(env, ['create-admin', '--email', 'admin@example.org', '--password-stdin'], 'kelp and cold water')
  const printed = await command(env, ['create-token', '--email', 'admin@example.org'])
  const api = apiWith(`http://127.0.0.1:${env.PORT}`, printed.trim().split('\n').at(-1) ?? '')
  let offing = await served(env)
  const { feedId, regionIds } = await furnish(api).catch(async (error: unknown) => {
    await offing.kill()
    throw error
  })
  return {
    dataDir, api, feedId, regionIds,
    offing: () => offing,
    restart: async () => {
      offing = await served(env)
    },
    remove: () => rm(dataDir, { recursive: true, force: true }),
  }
}

async function served(env: Record<string, string>): Promise<OffingProcess> {
  const offing = startOffing('production', env)
  await offing.until(/Offing answers at/, 30_000)
  return offing
}

async function command(env: Record<string, string>, args: string[], input = ''): Promise<string> {
  const running = startScript('dist/server/offing.js', args, env, input)
  const { code } = await running.ended
  if (code !== 0) throw new Error(`offing ${args[0]} ended with ${code}: ${running.printed()}`)
  return running.printed()
}

async function furnish(api: JourneyApi): Promise<{ feedId: number; regionIds: number[] }> {
  const feed = await api.call(endpoints.createFeed, {
    body: {
      name: 'Survey', quantity: 'chlorophyll', variable: 'chl_survey', unit: 'mg m-3', scale: 'log10',
      processingVersion: 'S1', fileNamePattern: 'survey-{yyyy}{MM}{dd}*',
    },
  })
  await api.call(endpoints.createSubscription, { body: { allRegions: true, minimumSeverity: 'Minor' } })
  const regionIds: number[] = []
  for (const [name, ring] of Object.entries(outlines)) {
    // Drawn for no feed yet: Offing would give it a first rule of its own as soon as its empty history is read, or not, as it happens.
    const region = await api.call(endpoints.createRegion, { body: { name, geometry: { type: 'Polygon', coordinates: [ring] } } })
    const definition = { ...defaultRule(), statistic: 'median' as const, test: { kind: 'above-level' as const, level: 5 } }
    const rule = await api.call(endpoints.createRule, { params: { id: region.id }, body: { feedId: feed.id, name: 'Above 5', definition } })
    await api.call(endpoints.activateRule, { params: { id: rule.id }, body: { ruleVersion: 1 } })
    regionIds.push(region.id)
  }
  return { feedId: feed.id, regionIds }
}

/** Files by their name, with how many were read so far; nothing is asked of a server that is down. */
export async function filesByName(api: JourneyApi): Promise<Map<string, FileItem>> {
  const { items } = await api.call(endpoints.listFiles)
  return new Map(items.map((item) => [item.name, item]))
}

/** What is still to be done; empty once every file and every judging has been dealt with. */
export async function unfinished(api: JourneyApi): Promise<string[]> {
  const files = await Promise.all((['received', 'processing'] as const).map((status) => api.call(endpoints.listFiles, { query: { status } })))
  const jobs = await Promise.all((['waiting', 'running', 'failed'] as const).map((state) => api.call(endpoints.listJobs, { query: { state } })))
  return [...files.flatMap(({ items }) => items.map(({ name }) => name)), ...jobs.flatMap(({ items }) => items.map(({ kind, subject }) => `${kind} ${subject}`))]
}

/** Everything people would see of the outcome, without the ids, which depend on the order of arrival. */
export async function outcome({ api, feedId, regionIds }: Station) {
  const layers = await api.call(endpoints.listLayers, { query: { feedId, limit: 500 } })
  const more = layers.nextCursor === null ? null : await api.call(endpoints.listLayers, { query: { feedId, limit: 500, cursor: layers.nextCursor } })
  const series = await Promise.all(
    regionIds.map(async (id) => {
      const { columns } = await api.call(endpoints.regionSeries, { params: { id }, query: { feedId } })
      return { ...columns, layerId: columns.layerId?.length }
    }),
  )
  const events = await Promise.all(regionIds.map((id) => api.call(endpoints.regionEvents, { params: { id } })))
  const alerts = await api.call(endpoints.listAlerts)
  const letters = await api.call(endpoints.listLetters)
  return {
    layerTimes: [...layers.items, ...(more?.items ?? [])].map(({ observedAt }) => observedAt).sort(),
    series,
    events: events.map(({ items }) => items.map(({ firstFlagged, lastFlagged, phase, peakValue, usableViews }) => ({ firstFlagged, lastFlagged, phase, peakValue, usableViews }))),
    alerts: alerts.items.map(({ regionName, state, triggerDay, severity }) => ({ regionName, state, triggerDay, severity })).sort((a, b) => a.regionName.localeCompare(b.regionName)),
    letters: letters.items.map(({ to, kind, subject }) => `${kind} to ${to}: ${subject.split(',')[0]}`).sort(),
  }
}
