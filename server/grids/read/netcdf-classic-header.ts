import { NetCDFReader } from 'netcdfjs'
import { LayerRefused } from '../layer-refused'
import { readExactly } from './bytes'
import { classicHeaderLength, HeaderGoesOn } from './classic-header-length'
import { maxVariables } from './limits'
import { type NumberType, type RawAttribute, type RawAttributes, type RawVariable, typeBytes } from './raw-netcdf'

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

const numberTypes: Record<string, NumberType> = {
  byte: 'i1', short: 'i2', int: 'i4', float: 'f4', double: 'f8',
}
const firstRead = 64 * 1024
const longestHeader = 16 * 1024 * 1024
const streaming = 0xffffffff

/** Parses the header from the first bytes and checks that everything it declares lies inside the file. */
export function readClassicHeader(descriptor: number, fileSize: number): ClassicHeader {
  const { header } = parse(descriptor, fileSize)
  const dimensions = header.dimensions ?? []
  if ((header.variables ?? []).length > maxVariables) {
    throw new LayerRefused('too-large', `The file declares more than ${maxVariables} variables.`, {})
  }
  const recordId = header.recordDimension.id
  const declared = (header.variables ?? []).map((variable) => {
    const type = numberTypes[variable.type] ?? null
    const sizes = variable.dimensions.map((id) => {
      const dimension = dimensions[id]
      if (!dimension) throw damaged(`${variable.name} names a dimension that does not exist`)
      return dimension
    })
    return { variable, type, sizes, record: recordId !== undefined && variable.dimensions[0] === recordId }
  })

  const bytesOf = ({ type, sizes, record }: (typeof declared)[number]): number => {
    const elements = sizes.slice(record ? 1 : 0).reduce((product, { size }) => product * size, 1)
    return elements * (type ? typeBytes[type] : 1)
  }
  const padded = (bytes: number) => Math.ceil(bytes / 4) * 4
  const records = declared.filter(({ record }) => record)
  // The format's one exception: a single record variable is not padded.
  const recordBytes =
    records.length === 1 ? bytesOf(records[0]!) : records.reduce((sum, item) => sum + padded(bytesOf(item)), 0)
  const firstRecord = Math.min(...records.map(({ variable }) => variable.offset))
  const recordCount =
    header.recordDimension.length === streaming
      ? Math.max(0, Math.floor((fileSize - firstRecord) / Math.max(1, recordBytes)))
      : header.recordDimension.length

  for (const item of declared) {
    const bytes = bytesOf(item)
    const steps = item.record ? recordCount : 1
    const end = steps === 0 ? 0 : item.variable.offset + (steps - 1) * recordBytes + bytes
    if (!Number.isSafeInteger(end)) throw damaged(`${item.variable.name} declares an impossible size`)
    if (end > fileSize) {
      throw new LayerRefused(
        'truncated',
        `This file is not whole: ${item.variable.name} should reach to byte ${end}, but the file has ${fileSize}.`,
        { variable: item.variable.name, neededBytes: end, fileSize },
      )
    }
  }

  return {
    recordBytes,
    attributes: attributesOf(header.globalAttributes ?? []),
    variables: declared.map(({ variable, type, sizes, record }) => ({
      name: utf8(variable.name),
      type,
      dimensions: sizes.map(({ name, size }, index) => ({
        name: utf8(name),
        size: record && index === 0 ? recordCount : size,
      })),
      attributes: attributesOf(variable.attributes),
      offset: variable.offset,
      record,
    })),
  }
}

function parse(descriptor: number, fileSize: number): NetCDFReader {
  for (let length = firstRead; ; length *= 4) {
    const size = Math.min(length, fileSize, longestHeader)
    const bytes = readExactly(descriptor, 0, size)
    try {
      return new NetCDFReader(bytes.subarray(0, classicHeaderLength(bytes)))
    } catch (error) {
      if (!(error instanceof HeaderGoesOn)) throw refused(error)
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

function refused(error: unknown): LayerRefused {
  const reason = error instanceof Error ? error.message : String(error)
  if (!/4GB/.test(reason)) return damaged(reason, error)
  return new LayerRefused(
    'unsupported-encoding',
    'Parts of this classic NetCDF file lie beyond 4 GB, which Offing cannot read yet; save it as NetCDF-4.',
    {},
    { cause: error },
  )
}

function damaged(reason: string, cause?: unknown): LayerRefused {
  return new LayerRefused('damaged', `The header of this NetCDF file is damaged: ${reason}.`, { reason }, { cause })
}

function attributesOf(list: readonly { name: string; type: string; value: unknown }[]): RawAttributes {
  const attributes = new Map<string, RawAttribute>()
  for (const { name, type, value } of list) {
    if (typeof value === 'string') attributes.set(utf8(name), { type: 'text', value: utf8(value).replace(/\0+$/, '') })
    else {
      const numbers = (Array.isArray(value) ? value : [value]).map(Number)
      // The parser answers bytes as unsigned; in the file they are signed.
      const signed = type === 'byte' ? numbers.map((byte) => (byte > 127 ? byte - 256 : byte)) : numbers
      if (signed.length === 0) continue
      attributes.set(utf8(name), {
        type: numberTypes[type] ?? 'f8',
        value: signed.length === 1 ? signed[0]! : signed,
      })
    }
  }
  return attributes
}

/** The parser reads text byte by byte; names and attributes are UTF-8. Text that is not stays as it was. */
function utf8(text: string): string {
  const decoded = Buffer.from(text, 'latin1').toString('utf8')
  return decoded.includes('\ufffd') ? text : decoded
}
