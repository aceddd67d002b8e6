import { inspectSource, type InspectReport } from '../grids/inspect'
import { isChlorophyllWithoutUnit, saysLogarithm } from '../grids/read/quantity'
import { describeGrid } from '../grids/describe-grid'
import { encodeGrid, gridFingerprint } from '../grids/grid-text'
import type { GridVariable, LayerTime } from '../grids/grid-source'
import { producerWords, type Stage } from '../grids/producer-words'
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
  /** Named as chlorophyll, of no unit: a person has to say it. */
  lacksUnit: boolean
  /** Stored as base-10 logarithms, by what the file says. */
  isLog10: boolean
  /** It is the error, bias, uncertainty, count or flags of another variable. */
  tellsOfAnother: boolean
  /** Position in `grids`. */
  grid: number
  times: LayerTime[]
  flagMeanings: string[]
  gapFilled: 'marked' | 'unmarked' | null
}

/** What a file holds, as far as feeds and layers need it, with the report for people. */
export interface Seen {
  report: InspectReport
  grids: SeenGrid[]
  variables: SeenVariable[]
  processingVersion: string | null
  /** As the file says; null where it does not. */
  stage: Stage | null
}

export async function inspectFile({ path, fileName }: Tasks['inspectFile']['input']): Promise<Seen> {
  const source = await sourceOf(path, fileName)
  try {
    const report = await inspectSource(source)
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
      const { flags, gapFilled, tellsOfAnother } = report.variables[i]!
      return { name, longName, quantity, unit, wavelengthNm, lacksUnit: isChlorophyllWithoutUnit(variable), isLog10: saysLogarithm(variable), tellsOfAnother, grid, times, flagMeanings: nameable(flags), gapFilled }
    })
    return { report, grids, variables, ...producerWords(source.globalAttributes) }
  } catch (error) {
    await forgetSource(path)
    throw error
  }
}

/** Meanings a feed can be set by: as many, and as long, as its schema takes. */
function nameable(flags: InspectReport['variables'][number]['flags']): string[] {
  return flags.map(({ meaning }) => meaning).filter((meaning) => meaning.length <= 100).slice(0, 200)
}
