import { mkdtemp, rm } from 'node:fs/promises'
import { createReadStream } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { writeNetcdf4 } from '../../server/grids/write/netcdf4'
import { drawRegion } from '../../server/desk/draw-region'
import { runNextJob } from '../../server/jobs/run-job'
import type { FeedRecord } from '../../server/models/feed'
import type { FileRecord } from '../../server/models/file'
import type { RegionRecord } from '../../server/models/region'
import { createFeed } from '../../server/pipeline/feeds'
import { receiveFile, type Arrival } from '../../server/pipeline/receive-file'
import { storeStream } from '../../server/pipeline/stored-files'
import { newFeed } from '../../shared/schemas/feeds'
import { newRegion } from '../../shared/schemas/regions'
import type { Person } from '../../server/accounts/person'
import type { Context } from '../../server/context'
import { aUser } from './people'

/** Ten by ten cells of a tenth of a degree in open sea, 12W..11W and 50N..51N. */
export const sea = {
  latitudes: Array.from({ length: 10 }, (_, i) => 50.05 + i / 10),
  longitudes: Array.from({ length: 10 }, (_, i) => -11.95 + i / 10),
  cells: 100,
}

/** Four by four whole cells of that sea. */
export const outline = {
  type: 'Polygon' as const,
  coordinates: [[[-11.8, 50.2], [-11.4, 50.2], [-11.4, 50.6], [-11.8, 50.6], [-11.8, 50.2]]],
}

export interface SeaStep {
  at: string
  /** One value for every cell, or a value by row and column; NaN is missing. */
  value: number | ((row: number, column: number) => number)
}

/** A chlorophyll file of the sea; its path lies in a folder that `cleanSea` removes. */
export async function seaFile(steps: readonly SeaStep[], { name = 'sea.nc', processingVersion = 'R1', madeAt }: { name?: string; processingVersion?: string; madeAt?: string } = {}): Promise<string> {
  const folder = await seaFolder()
  const data = new Float64Array(steps.length * sea.cells)
  for (const [s, step] of steps.entries()) {
    for (let cell = 0; cell < sea.cells; cell++) {
      const { value } = step
      data[s * sea.cells + cell] = typeof value === 'number' ? value : value(Math.floor(cell / 10), cell % 10)
    }
  }
  const path = join(folder, name)
  const attributes = { units: 'mg m-3', standard_name: 'mass_concentration_of_chlorophyll_a_in_sea_water' }
  await writeNetcdf4(path, {
    latitudes: sea.latitudes,
    longitudes: sea.longitudes,
    times: steps.map((step) => Date.parse(step.at)),
    variables: [{ name: 'chlor_a', dtype: 'f4', data, attributes }],
    globalAttributes: { processing_version: processingVersion, ...(madeAt ? { date_created: madeAt } : {}) },
    deflate: 1,
  })
  return path
}

const folders: string[] = []
/** A folder that `cleanSea` removes. */
export async function seaFolder(): Promise<string> {
  const folder = await mkdtemp(join(tmpdir(), 'offing-sea-'))
  folders.push(folder)
  return folder
}

export async function cleanSea(): Promise<void> {
  await Promise.all(folders.splice(0).map((folder) => rm(folder, { recursive: true, force: true })))
}

export async function aPerson(context: Context, roles: Person['roles'] = ['admin', 'analyst', 'officer']): Promise<Person> {
  const { id, email, name } = await aUser(context, { roles })
  return { id, email, name, roles, timeZone: 'UTC', by: { sessionId: 0 } }
}

export async function aFeed(context: Context, person: Person, wish: Record<string, unknown> = {}): Promise<FeedRecord> {
  const fields = { name: 'Chlorophyll', quantity: 'chlorophyll', variable: 'chlor_a', unit: 'mg m-3', scale: 'log10', processingVersion: 'R1' }
  return createFeed(context, person, newFeed.parse({ ...fields, ...wish }))
}

export async function aRegion(context: Context, person: Person, wish: Record<string, unknown> = {}): Promise<RegionRecord> {
  return drawRegion(context, person, newRegion.parse({ name: 'Quiet Water', geometry: outline, ...wish }))
}

/** Takes a file in as an upload would. */
export async function send(context: Context, path: string, wish: Partial<Arrival> = {}): Promise<FileRecord> {
  const arrived = await storeStream(context.env, createReadStream(path))
  return receiveFile(context, { name: path.split('/').at(-1)!, origin: 'upload', userId: null, feedId: null, observedAt: null, ...wish, arrived })
}

/** Runs every job that is due, as the ticker would. */
export async function runJobs(context: Context): Promise<void> {
  while (await runNextJob(context));
}

/** Daily steps of a quiet sea: the same few weeks of each year, values around 1 that differ a little from day to day. */
export function quietYears(years: readonly number[], from: string, days: number): SeaStep[] {
  return years.flatMap((year) =>
    Array.from({ length: days }, (_, i) => {
      const at = new Date(Date.parse(`${year}-${from}T12:00:00Z`) + i * 86_400_000).toISOString()
      return { at, value: 0.9 + 0.02 * ((i * 7 + year) % 11) }
    }),
  )
}
