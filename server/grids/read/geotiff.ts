import { closeSync, openSync } from 'node:fs'
import type { Grid, GridWindow } from '../../../shared/science/grid'
import type { GridSource, GridVariable, LayerTime } from '../grid-source'
import { LayerRefused } from '../layer-refused'
import { coverageOf, periodTime } from './coverage-time'
import { type BandNotes, bandNotes, datasetItems } from './geotiff-bands'
import { geotiffGrid } from './geotiff-place'
import { checkDeclaredGrid, maxBands, maxChunkBytes } from './limits'
import { type Meaning, meaningOf } from './quantity'
import { numberIn, numbersIn, readTiffDirectories, type TiffDirectory, type TiffLayout, tags } from './tiff-directory'
import { sampleFormatOf, type TiffRaster, tiffRaster } from './tiff-raster'
import { canReadSamples } from './tiff-samples'
import { prepareUnpacking, tiffCompressions } from './tiff-unpack'
import { convertInPlace, describeConversion } from './values'
import { checkWindow } from './window'

interface Band {
  index: number
  notes: BandNotes
  meaning: Meaning
  noData: number | null
  variable: GridVariable
}

const reducedResolution = 1
const transparencyMask = 4

/** A GeoTIFF at its full resolution: each band is a variable with one step. */
export async function openGeotiff(path: string, fileName: string, fileSize: number): Promise<GridSource> {
  const descriptor = openSync(path, 'r')
  try {
    const layout = readTiffDirectories(descriptor, fileSize)
    const directory = layout.directories.find((item) => kindOf(item) === 0)
    if (!directory) throw new LayerRefused('no-grid', 'This TIFF file holds only previews.', { fileName })
    checkIsMeasurement(directory, fileName)
    checkDeclaredGrid(fileName, numberIn(directory, tags.height, 0), numberIn(directory, tags.width, 0), 1)
    const grid = geotiffGrid(directory, fileName)
    const dataset = datasetItems(directory)
    const warnings: string[] = []
    const bands = readBands(directory, dataset, grid, [timeOf(dataset)], warnings)
    const mask = maskOf(layout, directory, fileName)
    for (const item of mask ? [directory, mask] : [directory]) await prepareUnpacking(numberIn(item, tags.compression, 1))
    const raster = tiffRaster(descriptor, directory, layout.littleEndian, bands[0]?.noData ?? 0)
    const valid = mask && tiffRaster(descriptor, mask, layout.littleEndian, 0)
    return {
      format: 'geotiff',
      variables: bands.map(({ variable }) => variable),
      // Under the name that other formats say it by, unless the producer's own metadata says it.
      globalAttributes: { ...dateMade(directory), ...dataset },
      warnings,
      readWindow: async (name, step, window) => readWindow(raster, valid, bands, name, step, window),
      readFlags: async (name) => {
        throw new RangeError(`${name} has no flags`)
      },
      close: () => closeSync(descriptor),
    }
  } catch (error) {
    closeSync(descriptor)
    throw error
  }
}

function dateMade(directory: TiffDirectory): { date_created?: string } {
  const made = directory.get(tags.dateTime)
  return typeof made === 'string' && made.trim() !== '' ? { date_created: made.trim() } : {}
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
  checkEncoding(directory, fileName)
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

function checkEncoding(directory: TiffDirectory, fileName: string): void {
  const refuse = (what: string, facts: Record<string, unknown>) =>
    new LayerRefused('unsupported-encoding', `This TIFF file ${what}, which Offing does not read.`, { fileName, ...facts })
  const compression = numberIn(directory, tags.compression, 1)
  if (!tiffCompressions.has(compression)) {
    throw refuse(`is compressed with method number ${compression}`, { compression })
  }
  const bits = numberIn(directory, tags.bits, 1)
  const format = sampleFormatOf(directory)
  const mixed = [tags.bits, tags.sampleFormat].some((tag) => new Set(numbersIn(directory, tag)).size > 1)
  if (mixed || !canReadSamples(bits, format)) {
    throw refuse(mixed ? 'has bands of several number types' : `stores numbers of ${bits} bits in format ${format}`, {
      bits, format,
    })
  }
  const predictor = numberIn(directory, tags.predictor, 1)
  const fits = predictor === 1 || (predictor === 2 && bits >= 8) || (predictor === 3 && format === 3)
  if (!fits) throw refuse(`uses predictor ${predictor} for its type of number`, { predictor })
  if (numberIn(directory, tags.fillOrder, 1) !== 1) throw refuse('stores its bits in reversed order', {})
}

function blockRows(directory: TiffDirectory): number {
  const height = numberIn(directory, tags.height, 0)
  return Math.min(height, numberIn(directory, tags.rowsPerStrip, height))
}

function readBands(
  directory: TiffDirectory,
  dataset: Record<string, string>,
  grid: Grid,
  times: LayerTime[],
  warnings: string[],
): Band[] {
  // Extra samples marked as alpha say how see-through a picture is; they hold no measurement.
  const alphas = numbersIn(directory, tags.extraSamples).filter((kind) => kind === 1 || kind === 2).length
  const count = numberIn(directory, tags.samples, 1) - alphas
  const bands: Band[] = []
  const names = new Set<string>()
  for (let index = 0; index < count; index++) {
    const notes = bandNotes(directory, index, dataset)
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
function maskOf({ directories }: TiffLayout, main: TiffDirectory, fileName: string): TiffDirectory | null {
  const mask = directories.find(
    (item) =>
      kindOf(item) === transparencyMask &&
      numberIn(item, tags.width, 0) === numberIn(main, tags.width, -1) &&
      numberIn(item, tags.height, 0) === numberIn(main, tags.height, -1),
  )
  if (mask) checkEncoding(mask, fileName)
  return mask ?? null
}

function timeOf(dataset: Record<string, string>): LayerTime {
  const coverage = coverageOf(dataset)
  if (!coverage) return { observedAt: null, endsAt: null, hasClock: false, from: 'none' }
  const from = 'global attribute'
  if (coverage.end !== null) return periodTime(coverage.start, coverage.end, null, from)
  return { observedAt: coverage.start, endsAt: null, hasClock: coverage.hasClock, from }
}

function readWindow(
  raster: TiffRaster,
  valid: TiffRaster | null,
  bands: Band[],
  name: string,
  step: number,
  window: GridWindow,
): Float64Array {
  const band = bands.find(({ variable }) => variable.name === name)
  if (!band) throw new RangeError(`the file has no band ${name}`)
  checkWindow(band.variable, step, window)
  const cells = window.rows * window.columns
  if (cells === 0) return new Float64Array(0)
  const values = unpacking(() => raster.read(band.index, window))
  const seen = valid && unpacking(() => valid.read(0, window))
  const { scale, offset } = band.notes
  for (let i = 0; i < cells; i++) {
    const value = values[i]!
    const missing = value === band.noData || !Number.isFinite(value) || seen?.[i] === 0
    values[i] = missing ? NaN : value * scale + offset
  }
  convertInPlace(values, band.meaning)
  return values
}

/** Whatever goes wrong while a block is unpacked becomes a refusal. */
function unpacking<T>(work: () => T): T {
  try {
    return work()
  } catch (error) {
    if (error instanceof LayerRefused) throw error
    const reason = error instanceof Error ? error.message : String(error)
    throw new LayerRefused('damaged', 'This TIFF file is damaged: its data cannot be read back whole.', {
      reason: reason.slice(0, 300),
    }, { cause: error })
  }
}
