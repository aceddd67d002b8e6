import type { GridSource, GridVariable } from './grid-source'
import type { FlagMeaning } from './flags'
import { gridFingerprint } from './grid-text'

/** Where a file says itself which cells are land: a flag of the variable, or a variable of its own on the same grid. */
export type LandMarks =
  | { kind: 'flag'; variable: string; flagVariable: string; meaning: FlagMeaning }
  | { kind: 'variable'; variable: string; marks: 'land' | 'sea'; steps: number }

/** Meanings that say "this cell is land" and nothing else; near land, or land below the pixel next door, is another thing. */
const landMeaning = /^(is_?|on_?)?land(_?(mask|flag|pixel|cell|surface))?$/i

const binaryMasks: Record<string, 'land' | 'sea'> = { land_binary_mask: 'land', sea_binary_mask: 'sea' }

/**
 * What a file says of land for one of its variables, by CF's standard names land_binary_mask and sea_binary_mask, else
 * by a flag meaning; null when it says nothing that Offing understands.
 */
export function landMarks(source: Pick<GridSource, 'variables'>, variableName: string): LandMarks | null {
  const variable = source.variables.find(({ name }) => name === variableName)
  if (!variable) return null
  const mask = source.variables.find((other) => marksOf(other) !== null && sameGrid(other, variable))
  if (mask) return { kind: 'variable', variable: mask.name, marks: marksOf(mask)!, steps: mask.times.length }
  const meaning = variable.flags?.meanings.find(({ name }) => landMeaning.test(name))
  return meaning && variable.flags ? { kind: 'flag', variable: variableName, flagVariable: variable.flags.variable, meaning } : null
}

/** "the flag LAND of quality", "the variable mask (sea_binary_mask)". */
export function landMarksText(marks: LandMarks): string {
  return marks.kind === 'flag' ? `the flag ${marks.meaning.name} of ${marks.flagVariable}` : `the variable ${marks.variable} (${marks.marks}_binary_mask)`
}

const marksOf = ({ standardName }: GridVariable): 'land' | 'sea' | null => binaryMasks[standardName?.trim() ?? ''] ?? null

function sameGrid(one: GridVariable, other: GridVariable): boolean {
  return one.grid === other.grid || gridFingerprint(one.grid) === gridFingerprint(other.grid)
}
