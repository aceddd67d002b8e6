import type { GridWindow } from '../../../shared/science/grid'
import { readExactly } from './bytes'
import { type Samples, type SampleLayout, samplesOf } from './tiff-samples'
import { numberIn, numbersIn, type TiffDirectory, tags } from './tiff-directory'
import { unpackBlock } from './tiff-unpack'

const mostKeptBytes = 32 * 1024 * 1024

/** One image of a TIFF file, read block by block; the blocks used last are kept. */
export interface TiffRaster {
  /** The numbers of one sample in a window, as they are stored. */
  read(sample: number, window: GridWindow): Float64Array
  /** Blocks that were read and unpacked so far. */
  readonly blocksRead: number
}

/**
 * `absent` stands for the cells of blocks that the writer left out: GDAL's way to store a block without any data.
 * Errors of unpacking are thrown as they come.
 */
export function tiffRaster(
  descriptor: number,
  directory: TiffDirectory,
  littleEndian: boolean,
  absent: number,
): TiffRaster {
  const layout = layoutOf(directory, littleEndian)
  const kept = new Map<number, Samples | null>()
  let blocksRead = 0

  const blockAt = (index: number): Samples | null => {
    const known = kept.get(index)
    if (known !== undefined) {
      kept.delete(index)
      kept.set(index, known)
      return known
    }
    const samples = readBlock(descriptor, layout, index)
    blocksRead++
    kept.set(index, samples)
    const most = Math.max(layout.acrossBlocks, Math.floor(mostKeptBytes / layout.wholeBytes))
    for (const oldest of kept.keys()) {
      if (kept.size <= most) break
      kept.delete(oldest)
    }
    return samples
  }

  return {
    get blocksRead() {
      return blocksRead
    },
    read(sample, window) {
      const values = new Float64Array(window.rows * window.columns)
      const { width, height } = layout.block
      const [firstRow, lastRow] = [Math.floor(window.row / height), Math.floor((window.row + window.rows - 1) / height)]
      const [firstColumn, lastColumn] = [
        Math.floor(window.column / width), Math.floor((window.column + window.columns - 1) / width),
      ]
      for (let r = firstRow; r <= lastRow; r++) {
        for (let c = firstColumn; c <= lastColumn; c++) {
          const plane = layout.separate ? sample * layout.blocksPerPlane : 0
          copyBlock(values, window, blockAt(plane + r * layout.acrossBlocks + c), layout, sample, r, c, absent)
        }
      }
      return values
    },
  }
}

interface Layout {
  compression: number
  offsets: number[]
  byteCounts: number[]
  block: SampleLayout
  imageHeight: number
  tiled: boolean
  separate: boolean
  acrossBlocks: number
  blocksPerPlane: number
  wholeBytes: number
}

function layoutOf(directory: TiffDirectory, littleEndian: boolean): Layout {
  const tiled = directory.has(tags.tileOffsets)
  const [width, height] = [numberIn(directory, tags.width, 0), numberIn(directory, tags.height, 0)]
  const separate = numberIn(directory, tags.planar, 1) === 2
  const block: SampleLayout = {
    width: tiled ? numberIn(directory, tags.tileWidth, 0) : width,
    height: tiled ? numberIn(directory, tags.tileHeight, 0) : Math.min(height, numberIn(directory, tags.rowsPerStrip, height)),
    perCell: separate ? 1 : numberIn(directory, tags.samples, 1),
    bits: numberIn(directory, tags.bits, 1),
    format: sampleFormatOf(directory),
    predictor: numberIn(directory, tags.predictor, 1),
    littleEndian,
  }
  const acrossBlocks = Math.ceil(width / block.width)
  return {
    compression: numberIn(directory, tags.compression, 1),
    offsets: numbersIn(directory, tiled ? tags.tileOffsets : tags.stripOffsets),
    byteCounts: numbersIn(directory, tiled ? tags.tileBytes : tags.stripBytes),
    block,
    imageHeight: height,
    tiled,
    separate,
    acrossBlocks,
    blocksPerPlane: acrossBlocks * Math.ceil(height / block.height),
    wholeBytes: Math.ceil((block.width * block.perCell * block.bits) / 8) * block.height,
  }
}

/** 4 means undefined, which readers take as unsigned. */
export function sampleFormatOf(directory: TiffDirectory): number {
  const format = numberIn(directory, tags.sampleFormat, 1)
  return format === 4 ? 1 : format
}

function readBlock(descriptor: number, layout: Layout, index: number): Samples | null {
  const bytes = layout.byteCounts[index]!
  if (bytes === 0) return null
  const packed = readExactly(descriptor, layout.offsets[index]!, bytes)
  const unpacked = unpackBlock(packed, layout.compression, layout.wholeBytes)
  const samples = samplesOf(unpacked, layout.block)
  const row = Math.floor((index % layout.blocksPerPlane) / layout.acrossBlocks)
  const rows = layout.tiled ? layout.block.height : Math.min(layout.block.height, layout.imageHeight - row * layout.block.height)
  if (samples.length < rows * layout.block.width * layout.block.perCell) throw new Error(`block ${index} ends early`)
  return samples
}

function copyBlock(
  values: Float64Array,
  window: GridWindow,
  samples: Samples | null,
  { block, separate }: Layout,
  sample: number,
  blockRow: number,
  blockColumn: number,
  absent: number,
): void {
  const { width, height, perCell } = block
  const [top, left] = [blockRow * height, blockColumn * width]
  const [fromRow, toRow] = [Math.max(window.row, top), Math.min(window.row + window.rows, top + height)]
  const [from, to] = [Math.max(window.column, left), Math.min(window.column + window.columns, left + width)]
  for (let row = fromRow; row < toRow; row++) {
    const target = (row - window.row) * window.columns - window.column
    if (samples === null) {
      values.fill(absent, target + from, target + to)
      continue
    }
    const source = ((row - top) * width - left) * perCell + (separate ? 0 : sample)
    for (let column = from; column < to; column++) values[target + column] = samples[source + column * perCell]!
  }
}
