import { LayerRefused } from '../layer-refused'
import { readExactly } from './bytes'
import { type ClassicVersion, HeaderGoesOn, type ParsedHeader, parseClassicHeader } from './classic-header-parser'
import { maxVariables } from './limits'
import { type RawAttributes, type RawVariable, typeBytes } from './raw-netcdf'

export interface ClassicVariable extends RawVariable {
  /** Where the variable (or its first record) begins in the file. */
  offset: number
  record: boolean
}

export interface ClassicHeader {
  variables: ClassicVariable[]
  attributes: RawAttributes
  /** Bytes from one record to the next. */
  recordBytes: number
}

const firstRead = 64 * 1024
const longestHeader = 16 * 1024 * 1024

const padding = (bytes: number): number => (4 - (bytes % 4)) % 4

/** Parses the header from the first bytes and checks that everything it declares lies inside the file. */
export function readClassicHeader(descriptor: number, fileSize: number): ClassicHeader {
  const header = parse(descriptor, fileSize)
  if (header.variables.length > maxVariables) {
    throw new LayerRefused('too-large', `The file declares more than ${maxVariables} variables.`, {})
  }
  if (header.dimensions.filter(({ size }) => size === 0).length > 1) throw damaged('two of its dimensions grow')
  const variables = header.variables.map(({ name, type, dimensions, attributes, offset }): ClassicVariable => {
    const named = dimensions.map((id) => {
      const dimension = header.dimensions[id]
      if (!dimension) throw damaged(`${name} names a dimension that does not exist`)
      return { ...dimension }
    })
    // The dimension that grows has size 0 in the header and may only come first.
    if (named.some(({ size }, index) => size === 0 && index > 0)) throw damaged(`${name} grows in a wrong dimension`)
    return { name, type, dimensions: named, attributes, offset, record: named[0]?.size === 0 }
  })
  const records = variables.filter(({ record }) => record)
  // The format's one exception: the records of a single record variable are not padded.
  const padded = records.length > 1
  const recordBytes = records.reduce((sum, variable) => {
    const bytes = bytesOf(variable)
    return sum + bytes + (padded ? padding(bytes) : 0)
  }, 0)
  const count = header.records ?? countRecords(records, recordBytes, padded, fileSize)
  for (const variable of records) variable.dimensions[0]!.size = count
  for (const variable of variables) checkInside(variable, variable.record ? count : 1, recordBytes, fileSize)
  return { variables, attributes: header.attributes, recordBytes }
}

/** Bytes of a whole variable, or of one record of it. */
function bytesOf({ type, dimensions, record }: ClassicVariable): number {
  const elements = dimensions.slice(record ? 1 : 0).reduce((product, { size }) => product * size, 1)
  return elements * (type ? typeBytes[type] : 1)
}

/** A streamed file: as many records as arrived whole. The padding behind the very last number may be missing. */
function countRecords(records: ClassicVariable[], recordBytes: number, padded: boolean, fileSize: number): number {
  if (records.length === 0 || recordBytes === 0) return 0
  const first = Math.min(...records.map(({ offset }) => offset))
  const last = records.reduce((a, b) => (b.offset > a.offset ? b : a))
  return Math.max(0, Math.floor((fileSize - first + (padded ? padding(bytesOf(last)) : 0)) / recordBytes))
}

function checkInside(variable: ClassicVariable, steps: number, recordBytes: number, fileSize: number): void {
  const end = steps === 0 ? 0 : variable.offset + (steps - 1) * recordBytes + bytesOf(variable)
  if (!Number.isSafeInteger(end)) throw damaged(`${variable.name} declares an impossible size`)
  if (end <= fileSize) return
  throw new LayerRefused(
    'truncated',
    `This file is not whole: ${variable.name} should reach to byte ${end}, but the file has ${fileSize}.`,
    { variable: variable.name, neededBytes: end, fileSize },
  )
}

function parse(descriptor: number, fileSize: number): ParsedHeader {
  for (let length = firstRead; ; length *= 4) {
    const size = Math.min(length, fileSize, longestHeader)
    const bytes = readExactly(descriptor, 0, size)
    try {
      return parseClassicHeader(bytes, bytes[3] as ClassicVersion)
    } catch (error) {
      if (!(error instanceof HeaderGoesOn)) throw damaged(error instanceof Error ? error.message : String(error), error)
      if (size === fileSize) {
        throw new LayerRefused(
          'truncated',
          'This NetCDF file ends inside its header; it was probably not sent whole.',
          { fileSize },
          { cause: error },
        )
      }
      if (size === longestHeader) throw damaged('it does not end')
    }
  }
}

function damaged(reason: string, cause?: unknown): LayerRefused {
  return new LayerRefused('damaged', `The header of this NetCDF file is damaged: ${reason}.`, { reason }, { cause })
}
