export type Samples =
  | Uint8Array | Int8Array | Uint16Array | Int16Array | Uint32Array | Int32Array | Float32Array | Float64Array

/** How the numbers of one block are stored. */
export interface SampleLayout {
  /** Columns and rows of the block. */
  width: number
  height: number
  /** Numbers a cell has in this block. */
  perCell: number
  bits: number
  /** 1 unsigned, 2 signed, 3 floating point. */
  format: number
  predictor: number
  littleEndian: boolean
}

export function canReadSamples(bits: number, format: number): boolean {
  if (format === 3) return [16, 32, 64].includes(bits)
  return format === 1 ? [1, 2, 4, 8, 16, 32, 64].includes(bits) : format === 2 && [8, 16, 32, 64].includes(bits)
}

export const rowBytes = ({ width, perCell, bits }: SampleLayout): number => Math.ceil((width * perCell * bits) / 8)

/**
 * The numbers of an unpacked block, row by row, cell by cell: byte order and predictor undone. Rows that are not there
 * (a last strip that ends with the image) are left out. Source: TIFF 6.0 and its technical note 3.
 */
export function samplesOf(bytes: Uint8Array, layout: SampleLayout): Samples {
  const { bits, format, predictor, littleEndian, perCell } = layout
  const perRow = layout.width * perCell
  const stride = rowBytes(layout)
  const rows = Math.min(layout.height, Math.floor(bytes.length / stride))
  if (bits < 8) return smallNumbers(bytes, bits, perRow, rows, stride)
  const native = new Uint8Array(rows * stride)
  native.set(bytes.subarray(0, rows * stride))
  const width = bits / 8
  if (predictor === 3) for (let row = 0; row < rows; row++) undoFloatPredictor(native, row * stride, perRow, width, perCell)
  else if (!littleEndian && width > 1) swap(native, width)
  if (predictor === 2) undoDifferences(native, rows, perRow, width, perCell)
  return numbersIn(native.buffer, bits, format)
}

function smallNumbers(bytes: Uint8Array, bits: number, perRow: number, rows: number, stride: number): Uint8Array {
  const numbers = new Uint8Array(rows * perRow)
  const mask = (1 << bits) - 1
  for (let row = 0; row < rows; row++) {
    for (let i = 0; i < perRow; i++) {
      const bit = i * bits
      numbers[row * perRow + i] = (bytes[row * stride + (bit >> 3)]! >> (8 - bits - (bit & 7))) & mask
    }
  }
  return numbers
}

function swap(bytes: Uint8Array, width: number): void {
  const buffer = Buffer.from(bytes.buffer, bytes.byteOffset, bytes.length)
  if (width === 2) buffer.swap16()
  else if (width === 4) buffer.swap32()
  else buffer.swap64()
}

/** Predictor 2: each number is stored as its difference from the one before in its row, modulo its size. */
function undoDifferences(bytes: Uint8Array<ArrayBuffer>, rows: number, perRow: number, width: number, perCell: number): void {
  const numbers = { 1: Uint8Array, 2: Uint16Array, 4: Uint32Array }[width]
  if (numbers) {
    const view = new numbers(bytes.buffer, bytes.byteOffset, rows * perRow)
    for (let row = 0; row < rows; row++) {
      const end = (row + 1) * perRow
      for (let i = row * perRow + perCell; i < end; i++) view[i] = view[i]! + view[i - perCell]!
    }
    return
  }
  const view = new BigUint64Array(bytes.buffer, bytes.byteOffset, rows * perRow)
  for (let row = 0; row < rows; row++) {
    const end = (row + 1) * perRow
    for (let i = row * perRow + perCell; i < end; i++) view[i] = view[i]! + view[i - perCell]!
  }
}

/**
 * Predictor 3: the bytes of a row's numbers stand in planes, most significant first whatever the file's byte order, and
 * each byte is stored as its difference from the one before.
 */
function undoFloatPredictor(bytes: Uint8Array, at: number, perRow: number, width: number, perCell: number): void {
  const row = bytes.subarray(at, at + perRow * width)
  for (let i = perCell; i < row.length; i++) row[i] = row[i]! + row[i - perCell]!
  const planes = row.slice()
  for (let i = 0; i < perRow; i++) {
    for (let plane = 0; plane < width; plane++) row[i * width + (width - 1 - plane)] = planes[plane * perRow + i]!
  }
}

function numbersIn(buffer: ArrayBuffer, bits: number, format: number): Samples {
  if (format === 3) {
    if (bits === 16) return Float32Array.from(new Uint16Array(buffer), halfToNumber)
    return bits === 32 ? new Float32Array(buffer) : new Float64Array(buffer)
  }
  if (bits === 8) return format === 2 ? new Int8Array(buffer) : new Uint8Array(buffer)
  if (bits === 16) return format === 2 ? new Int16Array(buffer) : new Uint16Array(buffer)
  if (bits === 32) return format === 2 ? new Int32Array(buffer) : new Uint32Array(buffer)
  return Float64Array.from(format === 2 ? new BigInt64Array(buffer) : new BigUint64Array(buffer), Number)
}

function halfToNumber(half: number): number {
  const sign = half & 0x8000 ? -1 : 1
  const exponent = (half >> 10) & 0x1f
  const fraction = half & 0x3ff
  if (exponent === 0) return sign * fraction * 2 ** -24
  if (exponent === 31) return fraction ? NaN : sign * Infinity
  return sign * (1 + fraction / 1024) * 2 ** (exponent - 15)
}
