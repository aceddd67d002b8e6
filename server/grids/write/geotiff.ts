import { writeFile } from 'node:fs/promises'
import { deflateSync } from 'node:zlib'

/** A north-up raster in degrees (EPSG:4326), one band of 32-bit floats. Row 0 is the northernmost. */
export interface GeotiffFile {
  rows: number
  columns: number
  /** West edge of the first column and north edge of the first row, in degrees. */
  west: number
  north: number
  lonStep: number
  latStep: number
  /** rows x columns, NaN where missing. */
  values: Float64Array
  /** What stands for missing in the file; NaN unless given. */
  noData?: number
  /** Side of the tiles, a multiple of 16; strips without it. */
  tile?: number
  deflate?: boolean
  /** Name and unit of the band, and file-wide items, as GDAL stores them. */
  description?: string
  unit?: string
  metadata?: Record<string, string>
}

interface Tag {
  id: number
  /** 2 text, 3 16-bit, 4 32-bit, 12 double */
  type: 2 | 3 | 4 | 12
  values: number[] | string
}

const typeBytes = { 2: 1, 3: 2, 4: 4, 12: 8 } as const

export async function writeGeotiff(path: string, file: GeotiffFile): Promise<void> {
  const { rows, columns, values, tile } = file
  if (values.length !== rows * columns) throw new RangeError(`${values.length} values for ${rows} x ${columns} cells`)
  if (tile !== undefined && (tile <= 0 || tile % 16 !== 0)) throw new RangeError('tiles are multiples of 16')
  const blockRows = tile ?? Math.max(1, Math.min(rows, Math.floor(65536 / (columns * 4))))
  const blockColumns = tile ?? columns
  const blocks: Buffer[] = []
  for (let row = 0; row < rows; row += blockRows) {
    for (let column = 0; column < columns; column += blockColumns) {
      // The last strip is cut at the bottom edge; tiles are always whole.
      const height = tile ?? Math.min(blockRows, rows - row)
      const block = encodeBlock(file, row, column, height, blockColumns)
      blocks.push(file.deflate ? deflateSync(block) : block)
    }
  }
  const tags = describe(file, blockRows, blocks)
  await writeFile(path, assemble(tags, blocks))
}

function encodeBlock(file: GeotiffFile, row: number, column: number, height: number, width: number): Buffer {
  const noData = file.noData ?? NaN
  const bytes = Buffer.alloc(height * width * 4)
  for (let r = 0; r < height; r++) {
    for (let c = 0; c < width; c++) {
      const inside = row + r < file.rows && column + c < file.columns
      const value = inside ? file.values[(row + r) * file.columns + column + c]! : NaN
      bytes.writeFloatLE(Number.isNaN(value) ? noData : value, (r * width + c) * 4)
    }
  }
  return bytes
}

function describe(file: GeotiffFile, blockRows: number, blocks: Buffer[]): Tag[] {
  const tiled = file.tile !== undefined
  const tags: Tag[] = [
    { id: 256, type: 4, values: [file.columns] },
    { id: 257, type: 4, values: [file.rows] },
    { id: 258, type: 3, values: [32] },
    { id: 259, type: 3, values: [file.deflate ? 8 : 1] },
    { id: 262, type: 3, values: [1] },
    { id: 277, type: 3, values: [1] },
    { id: 284, type: 3, values: [1] },
    { id: 339, type: 3, values: [3] },
    ...(tiled
      ? ([
          { id: 322, type: 4, values: [file.tile!] },
          { id: 323, type: 4, values: [file.tile!] },
        ] as Tag[])
      : ([{ id: 278, type: 4, values: [blockRows] }] as Tag[])),
    { id: tiled ? 324 : 273, type: 4, values: blocks.map(() => 0) },
    { id: tiled ? 325 : 279, type: 4, values: blocks.map((block) => block.length) },
    { id: 33550, type: 12, values: [file.lonStep, file.latStep, 0] },
    { id: 33922, type: 12, values: [0, 0, 0, file.west, file.north, 0] },
    // Geographic model, pixels are areas, EPSG:4326.
    { id: 34735, type: 3, values: [1, 1, 0, 3, 1024, 0, 1, 2, 1025, 0, 1, 1, 2048, 0, 1, 4326] },
    { id: 42113, type: 2, values: Number.isNaN(file.noData ?? NaN) ? 'nan' : String(file.noData) },
  ]
  const metadata = gdalMetadata(file)
  if (metadata) tags.push({ id: 42112, type: 2, values: metadata })
  return tags.sort((a, b) => a.id - b.id)
}

const escape = (text: string) => text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('"', '&quot;')

function gdalMetadata({ description, unit, metadata = {} }: GeotiffFile): string | null {
  const items = Object.entries(metadata).map(([name, text]) => `<Item name="${escape(name)}">${escape(text)}</Item>`)
  if (description) items.push(`<Item name="DESCRIPTION" sample="0" role="description">${escape(description)}</Item>`)
  if (unit) items.push(`<Item name="UNITTYPE" sample="0" role="unittype">${escape(unit)}</Item>`)
  return items.length ? `<GDALMetadata>${items.join('')}</GDALMetadata>` : null
}

function assemble(tags: Tag[], blocks: Buffer[]): Buffer {
  const encoded = tags.map((tag) => ({ tag, bytes: encodeTag(tag) }))
  const directoryAt = 8
  let next = directoryAt + 2 + tags.length * 12 + 4
  const places = encoded.map(({ bytes }) => {
    if (bytes.length <= 4) return null
    const at = next
    next += bytes.length + (bytes.length % 2)
    return at
  })
  const blockPlaces = blocks.map((block) => {
    const at = next
    next += block.length + (block.length % 2)
    return at
  })
  if (next > 0xffffffff) throw new RangeError('a plain GeoTIFF ends at 4 GiB')
  const out = Buffer.alloc(next)
  out.write('II', 0, 'latin1')
  out.writeUInt16LE(42, 2)
  out.writeUInt32LE(directoryAt, 4)
  out.writeUInt16LE(tags.length, directoryAt)
  encoded.forEach(({ tag, bytes }, index) => {
    const entry = directoryAt + 2 + index * 12
    const content = tag.id === 273 || tag.id === 324 ? encodeTag({ ...tag, values: blockPlaces }) : bytes
    out.writeUInt16LE(tag.id, entry)
    out.writeUInt16LE(tag.type, entry + 2)
    out.writeUInt32LE(content.length / typeBytes[tag.type], entry + 4)
    const place = places[index]
    if (place == null) content.copy(out, entry + 8)
    else {
      out.writeUInt32LE(place, entry + 8)
      content.copy(out, place)
    }
  })
  blocks.forEach((block, index) => block.copy(out, blockPlaces[index]!))
  return out
}

function encodeTag({ type, values }: Tag): Buffer {
  if (typeof values === 'string') return Buffer.from(`${values}\0`, 'utf8')
  const bytes = Buffer.alloc(values.length * typeBytes[type])
  values.forEach((value, i) => {
    if (type === 12) bytes.writeDoubleLE(value, i * 8)
    else if (type === 4) bytes.writeUInt32LE(value, i * 4)
    else bytes.writeUInt16LE(value, i * 2)
  })
  return bytes
}
