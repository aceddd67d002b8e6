import type { FoundAttributes, FoundAxis } from '../../shared/schemas/found'
import { describeGrid, type GridDescription } from './describe-grid'
import { type FirstStep, lookAtFirstStep } from './first-step'
import { AttributeKeeper } from './found-attributes'
import { foundAxes } from './found-axes'
import type { GridFormat, GridSource, GridVariable } from './grid-source'
import { producedAt } from './produced-at'
import { openGridSource } from './read/open'
import { tellsOfAnother } from './read/quantity'

/** What was understood of a file, safe to keep as JSON. */
export interface InspectReport {
  format: GridFormat
  variables: InspectedVariable[]
  warnings: string[]
  /** Of the whole file. */
  attributes: FoundAttributes
  /** ISO 8601, UTC; null when the file does not say when it was made. */
  producedAt: string | null
}

export interface InspectedVariable
  extends Pick<
    GridVariable,
    | 'name' | 'longName' | 'standardName' | 'unit' | 'fileUnit' | 'conversion' | 'quantity' | 'wavelengthNm'
    | 'validMin' | 'validMax' | 'dimensions'
  >, FirstStep {
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
  /** It is the error, bias, uncertainty, count or flags of another variable: no feed is proposed for it. */
  tellsOfAnother: boolean
  axes: FoundAxis[]
  attributes: FoundAttributes
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
  const keeper = new AttributeKeeper()
  const attributes = keeper.keep(source.globalAttributes)
  const variables: InspectedVariable[] = []
  for (const variable of source.variables) variables.push(await inspectVariable(source, variable, keeper))
  const made = producedAt(source.globalAttributes)
  return { format: source.format, variables, warnings: source.warnings, attributes, producedAt: made === null ? null : new Date(made).toISOString() }
}

async function inspectVariable(source: GridSource, variable: GridVariable, keeper: AttributeKeeper): Promise<InspectedVariable> {
  const { name, longName, standardName, unit, fileUnit, conversion, quantity, wavelengthNm } = variable
  const { validMin, validMax, dimensions } = variable
  return {
    name, longName, standardName, unit, fileUnit, conversion, quantity, wavelengthNm, validMin, validMax, dimensions,
    grid: describeGrid(variable.grid),
    times: describeTimes(variable),
    tellsOfAnother: tellsOfAnother(variable),
    axes: foundAxes(variable),
    attributes: keeper.keep(variable.attributes),
    ...(await lookAtFirstStep(source, variable)),
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
