import { LayerRefused } from '../layer-refused'
import { readExactly } from './bytes'

/** One image of a TIFF file: its tags as numbers or text. */
export type TiffDirectory = ReadonlyMap<number, number[] | string>

export const tags = {
  subfileType: 254, width: 256, height: 257, bits: 258, compression: 259, photometric: 262, stripOffsets: 273,
  samples: 277, rowsPerStrip: 278, stripBytes: 279, planar: 284, tileWidth: 322, tileHeight: 323, tileOffsets: 324,
  tileBytes: 325, extraSamples: 338, sampleFormat: 339, pixelScale: 33550, tiepoint: 33922, transformation: 34264,
  geoKeys: 34735, geoDoubles: 34736, geoText: 34737, metadata: 42112, noData: 42113, fillOrder: 266, dateTime: 306, predictor: 317,
} as const

const typeWidths: Record<number, number> = {
  1: 1, 2: 1, 3: 2, 4: 4, 5: 8, 6: 1, 7: 1, 8: 2, 9: 4, 10: 8, 11: 4, 12: 8, 13: 4, 16: 8, 17: 8, 18: 8,
}
const maxDirectories = 256
const maxTagBytes = 64 * 1024 * 1024

export interface TiffLayout {
  littleEndian: boolean
  directories: TiffDirectory[]
}

/**
 * Reads the directories of a TIFF or BigTIFF in either byte order and checks that every block they point to lies
 * inside the file: a cut file must not be read as if its missing part were empty.
 */
export function readTiffDirectories(descriptor: number, fileSize: number): TiffLayout {
  const head = readExactly(descriptor, 0, Math.min(16, fileSize))
  const endless = () => new LayerRefused('truncated', 'This TIFF file ends inside its header.', { fileSize })
  if (head.length < 8) throw endless()
  const numbers = numbersInOrder(head[0] === 0x49)
  const big = numbers.u2(head, 2) === 43
  if (big && head.length < 16) throw endless()
  let next = big ? numbers.u8(head, 8) : numbers.u4(head, 4)
  const directories: TiffDirectory[] = []
  const seen = new Set<number>()
  while (next !== 0) {
    if (seen.has(next)) throw damaged('its directories form a circle')
    if (directories.length >= maxDirectories) throw damaged(`it has more than ${maxDirectories} directories`)
    seen.add(next)
    const read = readDirectory(descriptor, next, fileSize, big, numbers)
    directories.push(read.directory)
    next = read.next
  }
  if (directories.length === 0) throw damaged('it holds no image')
  for (const directory of directories) checkBlocks(directory, fileSize)
  return { littleEndian: numbers.littleEndian, directories }
}

type Numbers = ReturnType<typeof numbersInOrder>

function numbersInOrder(littleEndian: boolean) {
  const view = (bytes: Buffer) => new DataView(bytes.buffer, bytes.byteOffset, bytes.length)
  return {
    littleEndian,
    u2: (bytes: Buffer, at: number) => view(bytes).getUint16(at, littleEndian),
    u4: (bytes: Buffer, at: number) => view(bytes).getUint32(at, littleEndian),
    u8: (bytes: Buffer, at: number) => Number(view(bytes).getBigUint64(at, littleEndian)),
    view,
  }
}

function readDirectory(descriptor: number, at: number, fileSize: number, big: boolean, numbers: Numbers) {
  const { u2, u4, u8 } = numbers
  const countBytes = big ? 8 : 2
  const entryBytes = big ? 20 : 12
  const inlineBytes = big ? 8 : 4
  const inside = (offset: number, length: number, what: string) => {
    if (offset + length > fileSize) throw cut(what, offset + length, fileSize)
    return readExactly(descriptor, offset, length)
  }
  const head = inside(at, countBytes, 'its directory')
  const count = big ? u8(head, 0) : u2(head, 0)
  if (count > 4096) throw damaged(`a directory declares ${count} tags`)
  const table = inside(at + countBytes, count * entryBytes + inlineBytes, 'its directory')
  const directory = new Map<number, number[] | string>()
  for (let i = 0; i < count; i++) {
    const entry = table.subarray(i * entryBytes, (i + 1) * entryBytes)
    const [id, type] = [u2(entry, 0), u2(entry, 2)]
    const length = big ? u8(entry, 4) : u4(entry, 4)
    const width = typeWidths[type]
    if (width === undefined) continue
    const bytes = length * width
    if (bytes > maxTagBytes) throw damaged(`tag ${id} declares ${bytes} bytes`)
    const where = entry.subarray(big ? 12 : 8)
    const offset = big ? u8(where, 0) : u4(where, 0)
    const content = bytes <= inlineBytes ? where.subarray(0, bytes) : inside(offset, bytes, `tag ${id}`)
    directory.set(id, decodeTag(content, type, length, numbers))
  }
  const tail = table.subarray(count * entryBytes)
  return { directory, next: big ? u8(tail, 0) : u4(tail, 0) }
}

function decodeTag(bytes: Buffer, type: number, length: number, { view, littleEndian }: Numbers): number[] | string {
  if (type === 2) return bytes.toString('utf8').replace(/\0[\s\S]*$/, '')
  const data = view(bytes)
  const read: Record<number, (i: number) => number> = {
    3: (i) => data.getUint16(i * 2, littleEndian),
    4: (i) => data.getUint32(i * 4, littleEndian),
    6: (i) => data.getInt8(i),
    8: (i) => data.getInt16(i * 2, littleEndian),
    9: (i) => data.getInt32(i * 4, littleEndian),
    11: (i) => data.getFloat32(i * 4, littleEndian),
    12: (i) => data.getFloat64(i * 8, littleEndian),
    13: (i) => data.getUint32(i * 4, littleEndian),
    16: (i) => Number(data.getBigUint64(i * 8, littleEndian)),
    17: (i) => Number(data.getBigInt64(i * 8, littleEndian)),
    18: (i) => Number(data.getBigUint64(i * 8, littleEndian)),
  }
  const decode = read[type] ?? ((i: number) => bytes[i]!)
  return Array.from({ length }, (_, i) => decode(i))
}

/** Sizes and counts are whole numbers, whatever type a damaged tag gives them. */
const wholeTags = [
  tags.width, tags.height, tags.bits, tags.compression, tags.samples, tags.rowsPerStrip, tags.planar, tags.tileWidth, tags.tileHeight,
  tags.stripOffsets, tags.stripBytes, tags.tileOffsets, tags.tileBytes, tags.predictor, tags.sampleFormat, tags.photometric,
]

function checkBlocks(directory: TiffDirectory, fileSize: number): void {
  for (const tag of wholeTags) {
    const value = directory.get(tag)
    if (typeof value === 'string' || value?.some((number) => !Number.isSafeInteger(number) || number < 0)) {
      throw damaged(`tag ${tag} holds no whole numbers`)
    }
  }
  const tiled = directory.has(tags.tileOffsets)
  const offsets = numbersIn(directory, tiled ? tags.tileOffsets : tags.stripOffsets)
  const bytes = numbersIn(directory, tiled ? tags.tileBytes : tags.stripBytes)
  const width = numberIn(directory, tags.width, 0)
  const height = numberIn(directory, tags.height, 0)
  if (width === 0 || height === 0) throw damaged('an image has no size')
  const blockWidth = tiled ? numberIn(directory, tags.tileWidth, 0) : width
  const blockHeight = tiled ? numberIn(directory, tags.tileHeight, 0) : numberIn(directory, tags.rowsPerStrip, height)
  if (blockWidth === 0 || blockHeight === 0) throw damaged('its blocks have no size')
  const planes = numberIn(directory, tags.planar, 1) === 2 ? numberIn(directory, tags.samples, 1) : 1
  const wanted = Math.ceil(width / blockWidth) * Math.ceil(height / blockHeight) * planes
  if (offsets.length < wanted || bytes.length < wanted) {
    throw damaged(`it needs ${wanted} blocks and names ${Math.min(offsets.length, bytes.length)}`)
  }
  for (let i = 0; i < wanted; i++) {
    const end = offsets[i]! + bytes[i]!
    if (end > fileSize) throw cut('its data', end, fileSize)
  }
  checkBlockSizes(directory, bytes.slice(0, wanted), blockWidth * blockHeight, { tiled, height, blockHeight, planes })
}

/** How many bytes one byte can become at most; above that the declared sizes are a lie. Uncompressed: exactly one. */
const largestRatio: Record<number, number> = { 1: 1, 5: 1500, 8: 1040, 32946: 1040, 32773: 64, 50000: 50_000 }

/** A block too short for the cells it stands for would be read as zeros, or cost memory before it fails. */
function checkBlockSizes(
  directory: TiffDirectory,
  bytes: number[],
  blockCells: number,
  layout: { tiled: boolean; height: number; blockHeight: number; planes: number },
): void {
  const ratio = largestRatio[numberIn(directory, tags.compression, 1)]
  const bits = numberIn(directory, tags.bits, 1)
  if (ratio === undefined || bits % 8 !== 0) return
  const samples = layout.planes === 1 ? numberIn(directory, tags.samples, 1) : 1
  const whole = (blockCells * samples * bits) / 8
  const perPlane = bytes.length / layout.planes
  const lastRows = layout.height % layout.blockHeight || layout.blockHeight
  bytes.forEach((count, i) => {
    const isLast = !layout.tiled && i % perPlane === perPlane - 1
    const expected = isLast ? (whole * lastRows) / layout.blockHeight : whole
    // No bytes at all is GDAL's way to leave out a block without data.
    if (count !== 0 && count * ratio < expected) {
      throw damaged(`block ${i} has ${count} bytes for ${expected} bytes of data`)
    }
  })
}

export function numbersIn(directory: TiffDirectory, tag: number): number[] {
  const value = directory.get(tag)
  return Array.isArray(value) ? value : []
}

export function numberIn(directory: TiffDirectory, tag: number, otherwise: number): number {
  return numbersIn(directory, tag)[0] ?? otherwise
}

function cut(what: string, needed: number, fileSize: number): LayerRefused {
  return new LayerRefused(
    'truncated',
    `This TIFF file is not whole: ${what} should reach to byte ${needed}, but the file has ${fileSize}.`,
    { neededBytes: needed, fileSize },
  )
}

function damaged(reason: string): LayerRefused {
  return new LayerRefused('damaged', `This TIFF file is damaged: ${reason}.`, { reason })
}
