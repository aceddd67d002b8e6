import { describeGrid, type GridDescription } from './describe-grid'
import type { GridFormat, GridSource, GridVariable } from './grid-source'
import { producedAt } from './produced-at'
import { openGridSource } from './read/open'

/** What was understood of a file, safe to keep as JSON. */
export interface InspectReport {
  format: GridFormat
  variables: InspectedVariable[]
  warnings: string[]
  /** ISO 8601, UTC; null when the file does not say when it was made. */
  producedAt: string | null
}

export interface InspectedVariable
  extends Pick<
    GridVariable,
    | 'name' | 'longName' | 'standardName' | 'unit' | 'fileUnit' | 'conversion' | 'quantity' | 'wavelengthNm'
    | 'validMin' | 'validMax' | 'dimensions'
  > {
  grid: GridDescription
  times: {
    count: number
    /** ISO 8601, UTC; null when the file has no time. */
    first: string | null
    last: string | null
    hasClock: boolean
    from: string
    /** Steps that stand for a period rather than an instant. */
    composites: number
  }
  /** Cells looked at in the first step (very large grids are looked at in bands), and those with a value. */
  cells: number
  valid: number
  min: number | null
  median: number | null
  max: number | null
}

/** Opens a file, says what was understood and closes it. Throws LayerRefused like `openGridSource`. */
export async function inspectGrid(path: string, fileName: string): Promise<InspectReport> {
  const source = await openGridSource(path, fileName)
  try {
    return await inspectSource(source)
  } finally {
    source.close()
  }
}

export async function inspectSource(source: GridSource): Promise<InspectReport> {
  const variables: InspectedVariable[] = []
  for (const variable of source.variables) variables.push(await inspectVariable(source, variable))
  const made = producedAt(source.globalAttributes)
  return { format: source.format, variables, warnings: source.warnings, producedAt: made === null ? null : new Date(made).toISOString() }
}

async function inspectVariable(source: GridSource, variable: GridVariable): Promise<InspectedVariable> {
  const { name, longName, standardName, unit, fileUnit, conversion, quantity, wavelengthNm } = variable
  const { validMin, validMax, dimensions } = variable
  return {
    name, longName, standardName, unit, fileUnit, conversion, quantity, wavelengthNm, validMin, validMax, dimensions,
    grid: describeGrid(variable.grid),
    times: describeTimes(variable),
    ...(await firstStep(source, variable)),
  }
}

function describeTimes({ times }: GridVariable): InspectedVariable['times'] {
  const known = times.flatMap(({ observedAt }) => (observedAt === null ? [] : [observedAt]))
  const iso = (time: number) => new Date(time).toISOString()
  return {
    count: times.length,
    first: known.length ? iso(known.reduce((a, b) => Math.min(a, b))) : null,
    last: known.length ? iso(known.reduce((a, b) => Math.max(a, b))) : null,
    hasClock: times.some(({ hasClock }) => hasClock),
    from: times[0]?.from ?? 'none',
    composites: times.filter(({ endsAt }) => endsAt !== null).length,
  }
}

const mostCells = 4_000_000
const bands = 16

async function firstStep(source: GridSource, variable: GridVariable) {
  const { rows, columns } = variable.grid
  const none = { cells: 0, valid: 0, min: null, median: null, max: null }
  if (variable.times.length === 0) return none
  const seen: Float64Array[] = []
  let cells = 0
  for (const band of bandsOf(rows, columns)) {
    const values = await source.readWindow(variable.name, 0, { row: band.row, column: 0, rows: band.rows, columns })
    cells += values.length
    seen.push(values.filter((value) => !Number.isNaN(value)))
  }
  const valid = seen.reduce((sum, { length }) => sum + length, 0)
  if (valid === 0) return { ...none, cells }
  const sorted = new Float64Array(valid)
  let filled = 0
  for (const values of seen) {
    sorted.set(values, filled)
    filled += values.length
  }
  sorted.sort()
  return { cells, valid, min: sorted[0]!, median: sorted[Math.ceil(valid / 2) - 1]!, max: sorted[valid - 1]! }
}

function bandsOf(rows: number, columns: number): { row: number; rows: number }[] {
  if (rows * columns <= mostCells) return [{ row: 0, rows }]
  const height = Math.max(1, Math.floor(mostCells / bands / columns))
  return Array.from({ length: bands }, (_, i) => ({ row: Math.floor(((rows - height) * i) / (bands - 1)), rows: height }))
}
