import { inspectSource, type InspectReport } from '../grids/inspect'
import { describeGrid } from '../grids/describe-grid'
import { encodeGrid, gridFingerprint } from '../grids/grid-text'
import type { GridVariable, LayerTime } from '../grids/grid-source'
import { flagsSeen, type FlagsSeen } from './flags-seen'
import { forgetSource, sourceOf } from './open-sources'
import type { Tasks } from './tasks'

/** A grid as the database keeps it. */
export interface SeenGrid {
  fingerprint: string
  definition: string
  kind: string
  rows: number
  columns: number
  west: number
  south: number
  east: number
  north: number
}

export interface SeenVariable {
  name: string
  longName: string | null
  quantity: GridVariable['quantity']
  unit: string | null
  wavelengthNm: number | null
  /** Position in `grids`. */
  grid: number
  times: LayerTime[]
  flagMeanings: string[]
  gapFilled: 'marked' | 'unmarked' | null
}

export interface FlaggedReport extends Omit<InspectReport, 'variables'> {
  variables: (InspectReport['variables'][number] & FlagsSeen)[]
}

/** What a file holds, as far as feeds and layers need it, with the report for people. */
export interface Seen {
  report: FlaggedReport
  grids: SeenGrid[]
  variables: SeenVariable[]
  processingVersion: string | null
  title: string | null
}

export async function inspectFile({ path, fileName }: Tasks['inspectFile']['input']): Promise<Seen> {
  const source = await sourceOf(path, fileName)
  try {
    const inspected = await inspectSource(source)
    const seen: FlagsSeen[] = []
    for (const variable of source.variables) seen.push(await flagsSeen(source, variable))
    const report = { ...inspected, variables: inspected.variables.map((variable, i) => ({ ...variable, ...seen[i]! })) }
    const grids: SeenGrid[] = []
    const variables = source.variables.map((variable, i) => {
      const fingerprint = gridFingerprint(variable.grid)
      let grid = grids.findIndex((known) => known.fingerprint === fingerprint)
      if (grid < 0) {
        grid = grids.length
        const { kind, rows, columns, west, south, east, north } = describeGrid(variable.grid)
        grids.push({ fingerprint, definition: encodeGrid(variable.grid), kind, rows, columns, west, south, east, north })
      }
      const { name, longName, quantity, unit, wavelengthNm, times } = variable
      const { flags, gapFilled } = seen[i]!
      return { name, longName, quantity, unit, wavelengthNm, grid, times, flagMeanings: nameable(flags), gapFilled }
    })
    const attribute = (name: string) => {
      const value = source.globalAttributes[name]
      return typeof value === 'string' && value.trim() ? value.trim().slice(0, 50) : null
    }
    return { report, grids, variables, processingVersion: attribute('processing_version'), title: attribute('title') }
  } catch (error) {
    await forgetSource(path)
    throw error
  }
}

/** Meanings a feed can be set by: as many, and as long, as its schema takes. */
function nameable(flags: FlagsSeen['flags']): string[] {
  return flags.map(({ meaning }) => meaning).filter((meaning) => meaning.length <= 100).slice(0, 200)
}
