import type { GridWindow } from '../../../shared/science/grid'
import type { FlagCells } from '../flags'
import { ancillaryNames, filledMeanings, flagBlock, flagMeanings, saysGapFilled } from './cf-flags'
import { lookUp } from './cf-roles'
import { blockOf, find, type PlacedVariable, upright } from './placed-variable'
import type { RawNetcdf } from './raw-netcdf'
import { checkWindow } from './window'

/** Gives each variable the flags that its ancillary_variables name, or the only flag variable on its grid. */
export function attachFlags(file: RawNetcdf, placed: PlacedVariable[], warnings: string[]): void {
  const flagged = placed.flatMap((candidate) => {
    const { meanings, problem } = flagMeanings(candidate.raw)
    if (problem) warnings.push(problem)
    return meanings ? [{ candidate, flags: { variable: candidate.raw.name, meanings } }] : []
  })
  for (const { raw, variable } of placed) {
    if (flagged.some(({ candidate }) => candidate.raw === raw)) continue
    const fitting = flagged.filter(
      ({ candidate: { variable: other, stepAxis } }) =>
        other.grid === variable.grid && (stepAxis === null || other.times.length === variable.times.length),
    )
    const named = new Set(ancillaryNames(raw).map((name) => lookUp(file, raw, name)?.name))
    const own = fitting.filter(({ flags }) => named.has(flags.variable))
    const chosen = own[0] ?? (fitting.length === 1 ? fitting[0] : undefined)
    if (chosen) variable.flags = chosen.flags
    const filled = (own.length ? own : fitting)
      .map(({ flags }) => ({ variable: flags.variable, meanings: filledMeanings(flags.meanings) }))
      .find(({ meanings }) => meanings.length > 0)
    if (filled) variable.gapFilled = filled
    else if (saysGapFilled(file, raw)) variable.gapFilled = { variable: null, meanings: [] }
  }
}

/** The flags of a window, from one of the variables that `attachFlags` named. */
export function readFlags(
  file: RawNetcdf,
  placed: PlacedVariable[],
  { variable }: PlacedVariable,
  step: number,
  window: GridWindow,
  flagVariable = variable.flags?.variable,
): FlagCells {
  const known = flagVariable !== undefined && [variable.flags?.variable, variable.gapFilled?.variable].includes(flagVariable)
  if (!known) throw new RangeError(`${variable.name} has no flags ${flagVariable ?? ''}`)
  const flags = find(placed, flagVariable)
  checkWindow(variable, step, window)
  const { start, count } = blockOf(flags, step, window)
  const { raw, high, missing } = flagBlock(file, flags.raw, start, count)
  return {
    raw: upright(flags, raw, window),
    high: high && upright(flags, high, window),
    missing: missing && upright(flags, missing, window),
  }
}
