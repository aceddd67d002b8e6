import type { FoundCells } from '../schemas/found'

/** What hides cells beside the flags a feed chooses. */
export const reasonFilled = 'filled in, not seen'
export const reasonOutside = 'outside the valid range'
export const reasonMissing = 'missing in the file'

export interface MaskedPart {
  reason: string
  /** All cells it holds for; a cell may have several reasons, so these need not add up. */
  cells: number
  /** Cells it is the first reason of, in the order of the parts: with those kept and unlisted they add up to all. */
  first: number
}

export interface KeptAndMasked {
  cells: number
  kept: number
  /** Chosen flags by the number of their cells, then cells filled in, outside the valid range, missing without such a flag. */
  parts: MaskedPart[]
  unlisted: number
}

/** Which of the cells looked at a feed would keep if it hid these flags, and what hides the others. */
export function keptAndMasked(found: FoundCells, hiddenFlags: readonly string[]): KeptAndMasked {
  const { reasons } = found
  const hides = reasons.some((reason) => reason === reasonFilled || hiddenFlags.includes(reason))
  // Which flags the rare mixtures carry matters only where some of them hide cells.
  const groups = hides ? found.groups : [...found.groups, { carry: [], ...found.unlisted }]
  const unlisted = hides ? sizeOf(found.unlisted) : 0
  const totals = reasons.map((_, at) => groups.reduce((sum, group) => sum + (group.carry.includes(at) ? sizeOf(group) : 0), 0))
  const flags = reasons
    .flatMap((reason, at) => (reason !== reasonFilled && hiddenFlags.includes(reason) ? [at] : []))
    .sort((a, b) => totals[b]! - totals[a]! || a - b)
  const filled = reasons.indexOf(reasonFilled)
  const order = filled < 0 ? flags : [...flags, filled]
  const parts = order.map((at): MaskedPart => ({ reason: reasons[at]!, cells: totals[at]!, first: 0 }))
  const outside: MaskedPart = { reason: reasonOutside, cells: 0, first: 0 }
  const missing: MaskedPart = { reason: reasonMissing, cells: 0, first: 0 }
  let kept = 0
  for (const group of groups) {
    const first = order.findIndex((at) => group.carry.includes(at))
    outside.cells += group.outside
    if (first >= 0) {
      parts[first]!.first += sizeOf(group)
      continue
    }
    kept += group.value
    outside.first += group.outside
    missing.first += group.missing
    missing.cells += group.missing
  }
  const cells = groups.reduce((sum, group) => sum + sizeOf(group), unlisted)
  return { cells, kept, parts: [...parts, outside, missing].filter((part) => part.cells > 0), unlisted }
}

function sizeOf({ value, missing, outside }: FoundCells['unlisted']): number {
  return value + missing + outside
}
