import type { Attribute, Dataset, Metadata } from 'h5wasm'
import { Module } from 'h5wasm/node'
import type { NumberType, RawAttribute, RawAttributes } from './raw-netcdf'

/** Bookkeeping of the format itself, no statement about the data. */
const internal = new Set([
  'DIMENSION_LIST', 'REFERENCE_LIST', 'CLASS', 'NAME', '_Netcdf4Dimid', '_Netcdf4Coordinates', '_NCProperties',
  '_nc3_strict',
])

/** Longest attribute taken; a longer one says nothing Offing needs and may be an attack. */
const maxAttributeBytes = 1024 * 1024

export function readAttributes(source: Pick<Dataset, 'attrs'>): RawAttributes {
  const attributes = new Map<string, RawAttribute>()
  const all = source.attrs
  for (const name of Object.keys(all)) {
    if (internal.has(name)) continue
    const attribute = all[name]!
    if (attribute.metadata.size * Math.max(1, attribute.metadata.total_size) > maxAttributeBytes) continue
    const raw = readAttribute(attribute)
    if (raw) attributes.set(name, raw)
  }
  return attributes
}

function readAttribute(attribute: Attribute): RawAttribute | null {
  const type = numberType(attribute.metadata)
  const isText = attribute.metadata.type === Module.H5T_class_t.H5T_STRING.value
  if (!type && !isText) return null
  const value = attribute.value
  const list = Array.isArray(value) || ArrayBuffer.isView(value) ? Array.from(value as ArrayLike<unknown>) : [value]
  if (isText) {
    const text = list.filter((item) => typeof item === 'string').join(' ')
    return { type: 'text', value: text.replace(/\0+$/, '') }
  }
  const numbers = list.map(Number)
  if (numbers.length === 0) return null
  return { type: type ?? 'f8', value: numbers.length === 1 ? numbers[0]! : numbers }
}

export function numberType(metadata: Metadata): NumberType | null {
  const classes = Module.H5T_class_t
  const { size, signed } = metadata
  if (metadata.type === classes.H5T_FLOAT.value) return size === 4 ? 'f4' : size === 8 ? 'f8' : null
  const isInteger = metadata.type === classes.H5T_INTEGER.value || metadata.type === classes.H5T_ENUM.value
  if (!isInteger) return null
  const letter = signed ? 'i' : 'u'
  return size === 1 || size === 2 || size === 4 || size === 8 ? `${letter}${size}` : null
}
