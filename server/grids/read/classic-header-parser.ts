import { type NumberType, type RawAttribute, typeBytes } from './raw-netcdf'

/** A header that contradicts itself, as opposed to one that goes on beyond the bytes at hand. */
export class BrokenHeader extends Error {}

/** Bytes at hand end before the header does. */
export class HeaderGoesOn extends Error {}

export type ClassicVersion = 1 | 2 | 5

export interface ParsedVariable {
  name: string
  /** null for text. */
  type: NumberType | null
  dimensions: number[]
  attributes: Map<string, RawAttribute>
  offset: number
}

export interface ParsedHeader {
  /** null: the file was streamed and its records were never counted. */
  records: number | null
  /** The record dimension has size 0. */
  dimensions: { name: string; size: number }[]
  attributes: Map<string, RawAttribute>
  variables: ParsedVariable[]
}

const [dimensionTag, variableTag, attributeTag] = [10, 11, 12]
const longestItem = 4 * 1024 * 1024
const mostItems = 100_000
const textType = 2
const types: Record<number, NumberType | undefined> = {
  1: 'i1', 3: 'i2', 4: 'i4', 5: 'f4', 6: 'f8', 7: 'u1', 8: 'u2', 9: 'u4', 10: 'i8', 11: 'u8',
}
/** Types 7 to 11 came with CDF-5. */
const lastType: Record<ClassicVersion, number> = { 1: 6, 2: 6, 5: 11 }

/**
 * The header of a CDF-1, CDF-2 or CDF-5 file. Nothing is allocated for a count before the bytes it counts are at hand,
 * so a few wrong bytes cannot cost gigabytes. Throws HeaderGoesOn when the bytes end first, BrokenHeader when they
 * contradict themselves. Source: NetCDF classic format specification.
 */
export function parseClassicHeader(bytes: Buffer, version: ClassicVersion): ParsedHeader {
  const header = new HeaderBytes(bytes, version)
  const records = header.count()
  const dimensions = header.list(dimensionTag, () => ({ name: header.name(), size: header.size() }))
  const attributes = new Map(header.list(attributeTag, () => header.attribute()))
  const variables = header.list(variableTag, (): ParsedVariable => {
    const name = header.name()
    const rank = header.size()
    if (rank > 1024) throw new BrokenHeader(`${name} has ${rank} dimensions`)
    const ids = Array.from({ length: rank }, () => header.size())
    const own = new Map(header.list(attributeTag, () => header.attribute()))
    const type = header.type()
    header.skipSize()
    return { name, dimensions: ids, attributes: own, type, offset: header.offset() }
  })
  return { records, dimensions, attributes, variables }
}

/** Walks over the bytes; every number in them is big-endian. */
class HeaderBytes {
  private at = 4

  constructor(private readonly bytes: Buffer, private readonly version: ClassicVersion) {}

  private take(length: number): number {
    if (length > longestItem) throw new BrokenHeader(`something in it is ${length} bytes long`)
    const from = this.at
    if (from + length > this.bytes.length) throw new HeaderGoesOn()
    this.at += length
    return from
  }

  private int(): number {
    return this.bytes.readUInt32BE(this.take(4))
  }

  private long(): bigint {
    return this.bytes.readBigUInt64BE(this.take(8))
  }

  /** A size or count: eight bytes in CDF-5, four before. */
  size(): number {
    if (this.version !== 5) return this.int()
    const value = this.long()
    if (value > BigInt(Number.MAX_SAFE_INTEGER)) throw new BrokenHeader(`it declares a size of ${value}`)
    return Number(value)
  }

  /** The number of records; all bits set says that nobody counted them. */
  count(): number | null {
    if (this.version !== 5) {
      const value = this.int()
      return value === 0xffffffff ? null : value
    }
    const value = this.long()
    return value === 0xffffffffffffffffn ? null : Number(value)
  }

  /** The stored size of a variable is not relied on: it is wrong by design where it does not fit its field. */
  skipSize(): void {
    this.take(this.version === 5 ? 8 : 4)
  }

  offset(): number {
    return this.version === 1 ? this.int() : Number(this.long())
  }

  name(): string {
    return this.text(this.size())
  }

  private text(length: number): string {
    const from = this.take(length)
    this.take((4 - (length % 4)) % 4)
    const bytes = this.bytes.subarray(from, from + length)
    const decoded = bytes.toString('utf8')
    return decoded.includes('\ufffd') ? bytes.toString('latin1') : decoded
  }

  list<T>(tag: number, item: () => T): T[] {
    const found = this.int()
    const count = this.size()
    if (found !== tag && (found !== 0 || count !== 0)) throw new BrokenHeader(`a list begins with ${found}`)
    if (count > mostItems) throw new BrokenHeader(`a list declares ${count} items`)
    const items: T[] = []
    for (let i = 0; i < count; i++) items.push(item())
    return items
  }

  /** null for text. */
  type(): NumberType | null {
    const code = this.int()
    if (code === textType) return null
    const known = code <= lastType[this.version] ? types[code] : undefined
    if (!known) throw new BrokenHeader(`it names an unknown type (${code})`)
    return known
  }

  attribute(): [string, RawAttribute] {
    const name = this.name()
    const type = this.type()
    const length = this.size()
    if (type === null) return [name, { type: 'text', value: this.text(length).replace(/\0+$/, '') }]
    const bytes = length * typeBytes[type]
    const from = this.take(bytes)
    this.take((4 - (bytes % 4)) % 4)
    const numbers = numbersAt(this.bytes, from, type, length)
    return [name, { type, value: numbers.length === 1 ? numbers[0]! : numbers }]
  }
}

function numbersAt(bytes: Buffer, at: number, type: NumberType, count: number): number[] {
  const read: Record<NumberType, (offset: number) => number> = {
    i1: (offset) => bytes.readInt8(offset),
    u1: (offset) => bytes.readUInt8(offset),
    i2: (offset) => bytes.readInt16BE(offset),
    u2: (offset) => bytes.readUInt16BE(offset),
    i4: (offset) => bytes.readInt32BE(offset),
    u4: (offset) => bytes.readUInt32BE(offset),
    i8: (offset) => Number(bytes.readBigInt64BE(offset)),
    u8: (offset) => Number(bytes.readBigUInt64BE(offset)),
    f4: (offset) => bytes.readFloatBE(offset),
    f8: (offset) => bytes.readDoubleBE(offset),
  }
  return Array.from({ length: count }, (_, i) => read[type](at + i * typeBytes[type]))
}
