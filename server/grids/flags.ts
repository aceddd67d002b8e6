/**
 * One named condition of a flag variable. Numbers are unsigned, whatever the sign of the variable's type: bit 31 of a
 * signed 32-bit variable is mask 2147483648. Mask and value: set where (flags AND mask) equals value. Mask alone: set
 * where any bit of it is. Value alone: set where the flags equal it.
 */
export interface FlagMeaning {
  name: string
  mask?: number
  value?: number
}

/** A variable of the file that says something about each cell of another. */
export interface FlagVariable {
  variable: string
  meanings: FlagMeaning[]
}

/** The stored flags of a window, row-major, as bits. */
export interface FlagCells {
  /** Bits 0 to 31. */
  raw: Uint32Array
  /** Bits 32 to 63; null for types that have none. */
  high: Uint32Array | null
  /** 1 where the flags themselves are missing, so nothing is known of the cell; null where none is. */
  missing: Uint8Array | null
}

/**
 * For each cell 1 where the meaning applies, else 0; a cell with missing flags has none. Source: CF conventions 3.5.
 */
export function cellsWith({ raw, high, missing }: FlagCells, meaning: FlagMeaning): Uint8Array {
  const test = testOf(meaning)
  return Uint8Array.from(raw, (low, i) => (missing?.[i] ? 0 : Number(test(low, high?.[i] ?? 0))))
}

/** The names of the meanings that apply to one cell's flags (bits 0 to 31 and, where there are more, 32 to 63). */
export function flagsSet(raw: number, meanings: readonly FlagMeaning[], high = 0): string[] {
  return meanings.filter((meaning) => testOf(meaning)(raw >>> 0, high >>> 0)).map(({ name }) => name)
}

function testOf({ mask, value }: FlagMeaning): (low: number, high: number) => boolean {
  const [maskLow, maskHigh] = halves(mask ?? 0)
  const [valueLow, valueHigh] = halves(value ?? 0)
  if (mask === undefined) return (low, high) => value !== undefined && low === valueLow && high === valueHigh
  if (value === undefined) return (low, high) => (low & maskLow) !== 0 || (high & maskHigh) !== 0
  return (low, high) => (low & maskLow) >>> 0 === valueLow && (high & maskHigh) >>> 0 === valueHigh
}

function halves(bits: number): [low: number, high: number] {
  return [bits % 2 ** 32, Math.floor(bits / 2 ** 32)]
}
