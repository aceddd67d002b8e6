import { join } from 'node:path'
import type { Person } from '../../server/accounts/person'
import type { Context } from '../../server/context'
import { writeNetcdf4 } from '../../server/grids/write/netcdf4'
import type { FeedRecord } from '../../server/models/feed'
import { createFeed } from '../../server/pipeline/feeds'
import { newFeed } from '../../shared/schemas/feeds'
import { sea, seaFolder } from './sea'

/** One value for every cell, or a value by row and column; NaN is missing. */
type Field = number | ((row: number, column: number) => number)
export type Spectrum = Record<number, Field>

/** Spectra whose ratio of 443 over 555 nm is 2, and 1. */
export const blueWater: Spectrum = { 443: 0.004, 490: 0.0035, 510: 0.003, 555: 0.002, 670: 0.0002 }
export const greenWater: Spectrum = { 443: 0.002, 490: 0.002, 510: 0.002, 555: 0.002, 670: 0.0013 }
/** As bright and white as shed coccoliths make it. */
export const whiteWater: Spectrum = { 443: 0.011, 490: 0.0115, 510: 0.0112, 555: 0.0095, 670: 0.003 }

/** A file of reflectances of the sea, one variable a band, one step a time. */
export async function reflectanceFile(
  steps: readonly { at: string; rrs: Spectrum }[],
  { name = 'rrs.nc', processingVersion = 'R1', bands = [443, 490, 510, 555, 670] }: { name?: string; processingVersion?: string; bands?: number[] } = {},
): Promise<string> {
  const variables = bands.map((nm) => ({
    name: `Rrs_${nm}`,
    dtype: 'f4' as const,
    data: Float64Array.from({ length: steps.length * sea.cells }, (_, i) => {
      const cell = i % sea.cells
      const value = steps[Math.floor(i / sea.cells)]!.rrs[nm]!
      return typeof value === 'number' ? value : value(Math.floor(cell / 10), cell % 10)
    }),
    attributes: { units: 'sr-1', long_name: `Remote sensing reflectance at ${nm} nm` },
  }))
  const path = join(await seaFolder(), name)
  await writeNetcdf4(path, {
    latitudes: sea.latitudes,
    longitudes: sea.longitudes,
    times: steps.map((step) => Date.parse(step.at)),
    variables,
    globalAttributes: { processing_version: processingVersion },
    deflate: 1,
  })
  return path
}

export async function aBandFeed(context: Context, person: Person, nm: number, wish: Record<string, unknown> = {}): Promise<FeedRecord> {
  const fields = { name: `Reflectance ${nm}`, quantity: 'reflectance', variable: `Rrs_${nm}`, unit: 'sr-1', scale: 'linear', processingVersion: 'R1' }
  return createFeed(context, person, newFeed.parse({ ...fields, ...wish }))
}

export async function aDerivedFeed(context: Context, person: Person, derivedFrom: number, wish: Record<string, unknown> = {}): Promise<FeedRecord> {
  const fields = { name: 'Chlorophyll by OC4', derivedFrom, formula: 'oc4-seawifs', formulaVersion: '2019' }
  return createFeed(context, person, newFeed.parse({ ...fields, ...wish }))
}
