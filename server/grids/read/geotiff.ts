import { fromFile, type GeoTIFF, type GeoTIFFImage } from 'geotiff'
import type { Grid, GridWindow } from '../../../shared/science/grid'
import type { GridSource, GridVariable, LayerTime } from '../grid-source'
import { LayerRefused } from '../layer-refused'
import { coverageOf, periodTime } from './coverage-time'
import { type BandNotes, bandNotes, datasetItems } from './geotiff-bands'
import { geotiffGrid } from './geotiff-place'
import { checkDeclaredGrid, maxBands, maxChunkBytes } from './limits'
import { type Meaning, meaningOf } from './quantity'
import { useOwnZstdDecoder } from './tiff-zstd'
import { numberIn, numbersIn, readTiffDirectories, type TiffDirectory, tags } from './tiff-directory'
import { convertInPlace, describeConversion } from './values'
import { checkWindow } from './window'

interface Band {
  index: number
  notes: BandNotes
  meaning: Meaning
  noData: number | null
  variable: GridVariable
}

/** None, LZW, deflate (two numbers), packbits, ZSTD. JPEG and WebP lose values; damaged LERC can hang its decoder. */
const compressions = new Set([1, 5, 8, 32946, 32773, 50000])
const reducedResolution = 1
const transparencyMask = 4

/** A GeoTIFF at its full resolution: each band is a variable with one step. */
export async function openGeotiff(path: string, fileName: string, fileSize: number): Promise<GridSource> {
  const directories = readTiffDirectories(path, fileSize)
  const place = directories.findIndex((item) => kindOf(item) === 0)
  const directory = directories[place]
  if (!directory) throw new LayerRefused('no-grid', 'This TIFF file holds only previews.', { fileName })
  checkIsMeasurement(directory, fileName)
  checkDeclaredGrid(fileName, numberIn(directory, tags.height, 0), numberIn(directory, tags.width, 0), 1)

  useOwnZstdDecoder()
  const tiff = await decoding(() => fromFile(path))
  try {
    const image = await decoding(() => tiff.getImage(place))
    const grid = geotiffGrid(image, directory, fileName)
    const dataset = await decoding(() => datasetItems(image))
    const times = [timeOf(dataset)]
    const warnings: string[] = []
    const bands = await readBands(image, directory, dataset, grid, times, warnings)
    const mask = await maskOf(tiff, directories, directory)
    return {
      format: 'geotiff',
      variables: bands.map(({ variable }) => variable),
      globalAttributes: dataset,
      warnings,
      readWindow: (name, step, window) => readWindow(image, mask, bands, name, step, window),
      close: () => void tiff.close(),
    }
  } catch (error) {
    tiff.close()
    throw error
  }
}

const kindOf = (directory: TiffDirectory) =>
  numberIn(directory, tags.subfileType, 0) & (reducedResolution | transparencyMask)

function checkIsMeasurement(directory: TiffDirectory, fileName: string): void {
  const photometric = numberIn(directory, tags.photometric, 1)
  if (photometric > 1) {
    throw new LayerRefused(
      'no-quantity',
      'This TIFF file is a picture (its numbers are colours), not measurements.',
      { fileName, photometric },
    )
  }
  const samples = numberIn(directory, tags.samples, 1)
  if (samples > maxBands) {
    throw new LayerRefused('too-large', `This TIFF file declares ${samples} bands; Offing reads up to ${maxBands}.`, {
      fileName, samples, maxBands,
    })
  }
  const compression = numberIn(directory, tags.compression, 1)
  if (!compressions.has(compression)) {
    throw new LayerRefused(
      'unsupported-encoding',
      `This TIFF file is compressed with a method Offing does not read (number ${compression}).`,
      { fileName, compression },
    )
  }
  const tiled = directory.has(tags.tileWidth)
  const width = numberIn(directory, tiled ? tags.tileWidth : tags.width, 0)
  const height = tiled ? numberIn(directory, tags.tileHeight, 0) : blockRows(directory)
  const bytes = (width * height * numberIn(directory, tags.bits, 8) * samples) / 8
  if (bytes > maxChunkBytes) {
    throw new LayerRefused('too-large', `This TIFF file is stored in blocks of ${bytes} bytes, too large to unpack.`, {
      fileName, blockBytes: bytes, maxChunkBytes,
    })
  }
}

function blockRows(directory: TiffDirectory): number {
  const height = numberIn(directory, tags.height, 0)
  return Math.min(height, numberIn(directory, tags.rowsPerStrip, height))
}

async function readBands(
  image: GeoTIFFImage,
  directory: TiffDirectory,
  dataset: Record<string, string>,
  grid: Grid,
  times: LayerTime[],
  warnings: string[],
): Promise<Band[]> {
  // Extra samples marked as alpha say how see-through a picture is; they hold no measurement.
  const alphas = numbersIn(directory, tags.extraSamples).filter((kind) => kind === 1 || kind === 2).length
  const count = image.getSamplesPerPixel() - alphas
  const bands: Band[] = []
  const names = new Set<string>()
  for (let index = 0; index < count; index++) {
    const notes = await decoding(() => bandNotes(image, index, dataset))
    if (names.has(notes.name)) notes.name = `band ${index + 1}`
    names.add(notes.name)
    if (!Number.isFinite(notes.scale) || notes.scale === 0 || !Number.isFinite(notes.offset)) {
      throw new LayerRefused('damaged', `${notes.name} has an impossible scale or offset.`, { band: index + 1 })
    }
    const named = {
      name: notes.name, longName: notes.longName, standardName: notes.standardName, fileUnit: notes.unit,
    }
    const meaning = meaningOf({ ...named, wavelengthAttribute: null })
    if (meaning.warning) warnings.push(meaning.warning)
    const packed = notes.scale !== 1 || notes.offset !== 0
    bands.push({
      index,
      notes,
      meaning,
      noData: noDataOf(directory),
      variable: {
        ...named,
        unit: meaning.unit,
        conversion: describeConversion(packed ? `scale ${notes.scale}, offset ${notes.offset}` : null, meaning),
        quantity: meaning.quantity,
        wavelengthNm: meaning.wavelengthNm,
        validMin: null,
        validMax: null,
        grid,
        times,
        attributes: notes.items,
        dimensions: [{ name: 'row', size: grid.rows }, { name: 'column', size: grid.columns }],
      },
    })
  }
  return bands
}

function noDataOf(directory: TiffDirectory): number | null {
  const text = directory.get(tags.noData)
  if (typeof text !== 'string' || text.trim() === '') return null
  const value = /^[+-]?nan/i.test(text.trim()) ? NaN : Number(text.trim())
  const isFloat32 = numberIn(directory, tags.sampleFormat, 1) === 3 && numberIn(directory, tags.bits, 8) === 32
  return isFloat32 ? Math.fround(value) : value
}

/** GDAL may keep a mask of valid cells as an image of its own; without it masked cells would look measured. */
async function maskOf(
  tiff: GeoTIFF,
  directories: TiffDirectory[],
  main: TiffDirectory,
): Promise<GeoTIFFImage | null> {
  const place = directories.findIndex(
    (item) =>
      kindOf(item) === transparencyMask &&
      numberIn(item, tags.width, 0) === numberIn(main, tags.width, -1) &&
      numberIn(item, tags.height, 0) === numberIn(main, tags.height, -1),
  )
  return place < 0 ? null : decoding(() => tiff.getImage(place))
}

function timeOf(dataset: Record<string, string>): LayerTime {
  const coverage = coverageOf(dataset)
  if (!coverage) return { observedAt: null, endsAt: null, hasClock: false, from: 'none' }
  const from = 'global attribute'
  if (coverage.end !== null) return periodTime(coverage.start, coverage.end, null, from)
  return { observedAt: coverage.start, endsAt: null, hasClock: coverage.hasClock, from }
}

async function readWindow(
  image: GeoTIFFImage,
  mask: GeoTIFFImage | null,
  bands: Band[],
  name: string,
  step: number,
  window: GridWindow,
): Promise<Float64Array> {
  const band = bands.find(({ variable }) => variable.name === name)
  if (!band) throw new RangeError(`the file has no band ${name}`)
  checkWindow(band.variable, step, window)
  const cells = window.rows * window.columns
  if (cells === 0) return new Float64Array(0)
  const stored = await readSamples(image, band.index, window)
  const valid = mask ? await readSamples(mask, 0, window) : null
  const { scale, offset } = band.notes
  const values = new Float64Array(cells)
  for (let i = 0; i < cells; i++) {
    const value = stored[i]!
    const missing = value === band.noData || !Number.isFinite(value) || valid?.[i] === 0
    values[i] = missing ? NaN : value * scale + offset
  }
  convertInPlace(values, band.meaning)
  return values
}

async function readSamples(image: GeoTIFFImage, sample: number, window: GridWindow): Promise<ArrayLike<number>> {
  const { row, column, rows, columns } = window
  const rasters = await decoding(() =>
    image.readRasters({ window: [column, row, column + columns, row + rows], samples: [sample], interleave: false }),
  )
  const raster = rasters[0]
  if (!raster || raster.length !== rows * columns) throw damagedData('fewer cells came back than were asked for')
  return raster
}

/** Whatever the decoder throws (some of it plain text) becomes a refusal. */
async function decoding<T>(work: () => Promise<T>): Promise<T> {
  try {
    return await work()
  } catch (error) {
    throw damagedData(error instanceof Error ? error.message : String(error), error)
  }
}

function damagedData(reason: string, cause?: unknown): LayerRefused {
  return new LayerRefused('damaged', 'This TIFF file is damaged: its data cannot be read back whole.', {
    reason: reason.slice(0, 300),
  }, { cause })
}
