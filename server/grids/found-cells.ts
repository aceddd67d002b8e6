import type { FoundCells } from '../../shared/schemas/found'
import { reasonFilled } from '../../shared/science/kept-and-masked'
import { type FlagCells, type FlagMeaning, cellsWith } from './flags'

const mostGroups = 200

/** What the file holds for a cell. */
export const cellHolds = { value: 0, missing: 1, outside: 2 } as const

export interface FlagsRead {
  cells: FlagCells
  meanings: readonly FlagMeaning[]
  /** Set where the meanings mark cells that were filled in: they are one reason together. */
  filled: boolean
}

/**
 * Groups cells by the reasons they carry; made piece by piece, so that a large grid is never held whole. Cells of the
 * rarest mixtures beyond 200 are only counted.
 */
export class CellGroups {
  private readonly reasons: string[] = []
  private readonly groups = new Map<string, { carry: number[]; counts: [number, number, number] }>()

  /** `holds` has one of `cellHolds` for each cell of a piece; `flags` those of the same cells. */
  add(holds: Uint8Array, flags: readonly FlagsRead[]): void {
    const classes = new Uint32Array(holds.length)
    for (const { cells } of flags) for (const words of wordsOf(cells)) refine(classes, words)
    refine(classes, holds)
    const sizes: number[] = []
    const examples: number[] = []
    for (let cell = 0; cell < classes.length; cell++) {
      const group = classes[cell]!
      if (sizes[group] === undefined) {
        sizes[group] = 0
        examples[group] = cell
      }
      sizes[group]++
    }
    const carried = examples.map(() => [] as number[])
    for (const read of flags) this.noteReasons(read, examples, carried)
    examples.forEach((cell, group) => this.count([...new Set(carried[group])].sort((a, b) => a - b), holds[cell]!, sizes[group]!))
  }

  found(): FoundCells {
    const all = [...this.groups.values()].sort((a, b) => total(b.counts) - total(a.counts))
    const groups = all.slice(0, mostGroups).map(({ carry, counts: [value, missing, outside] }) => ({ carry, value, missing, outside }))
    const unlisted = { value: 0, missing: 0, outside: 0 }
    for (const { counts: [value, missing, outside] } of all.slice(mostGroups)) {
      unlisted.value += value
      unlisted.missing += missing
      unlisted.outside += outside
    }
    return { reasons: [...this.reasons], groups, unlisted }
  }

  /** Cells each meaning applies to, rare mixtures too. */
  countOf(reason: string): number {
    const at = this.reasons.indexOf(reason)
    let sum = 0
    for (const { carry, counts } of this.groups.values()) if (carry.includes(at)) sum += total(counts)
    return sum
  }

  private noteReasons({ cells, meanings, filled }: FlagsRead, examples: number[], carried: number[][]): void {
    const few: FlagCells = {
      raw: Uint32Array.from(examples, (cell) => cells.raw[cell]!),
      high: cells.high && Uint32Array.from(examples, (cell) => cells.high![cell]!),
      missing: cells.missing && Uint8Array.from(examples, (cell) => cells.missing![cell]!),
    }
    for (const meaning of meanings) {
      const at = this.reasonAt(filled ? reasonFilled : meaning.name)
      cellsWith(few, meaning).forEach((set, group) => {
        if (set) carried[group]!.push(at)
      })
    }
  }

  private reasonAt(reason: string): number {
    const known = this.reasons.indexOf(reason)
    return known >= 0 ? known : this.reasons.push(reason) - 1
  }

  private count(carry: number[], holds: number, cells: number): void {
    const key = carry.join()
    const group = this.groups.get(key) ?? { carry, counts: [0, 0, 0] }
    this.groups.set(key, group)
    group.counts[holds as 0 | 1 | 2] += cells
  }
}

const total = ([value, missing, outside]: readonly [number, number, number]): number => value + missing + outside

function* wordsOf({ raw, high, missing }: FlagCells): Generator<Uint32Array | Uint8Array> {
  yield raw
  if (high) yield high
  if (missing) yield missing
}

/** Splits classes of cells by a second word each, numbering the new classes from 0. */
function refine(classes: Uint32Array, words: Uint32Array | Uint8Array): void {
  const known = new Map<number, number>()
  for (let cell = 0; cell < classes.length; cell++) {
    const key = classes[cell]! * 2 ** 32 + words[cell]!
    let at = known.get(key)
    if (at === undefined) {
      at = known.size
      known.set(key, at)
    }
    classes[cell] = at
  }
}
