import { closeSync, openSync } from 'node:fs'
import { basename } from 'node:path'
import type { Dataset, File, Group } from 'h5wasm'
import { guarded, hdf5Library, PointsElsewhere, quietly } from '../hdf5-library'
import { LayerRefused } from '../layer-refused'
import { openChunkReader, orNull, type ChunkReader } from './hdf5-chunks'
import { oddNumbers } from './hdf5-number-type'
import { checkHdf5Size } from './hdf5-superblock'
import { maxChunkBytes, maxVariables } from './limits'
import { numberType, readAttributes } from './netcdf4-attributes'
import type { RawNetcdf, RawVariable } from './raw-netcdf'
import { StepCache } from './step-cache'

const deepestGroup = 8
const blockCells = 4 * 1024 * 1024
/** Numbers kept of chunks that hold many steps: 64 MB. */
const mostKeptCells = 8 * 1024 * 1024
/** Filters the library and its plugins can undo: deflate, shuffle, fletcher32, szip, nbit, scale-offset, then plugins. */
const knownFilters = new Set([1, 2, 3, 4, 5, 6, 307, 32000, 32001, 32004, 32008, 32013, 32015, 32022, 32023, 32026])

/** A NetCDF-4 or HDF5 file. Dimension scales name the dimensions; variables in groups are called group/name. */
export async function openNetcdf4(path: string, start: number, fileSize: number): Promise<RawNetcdf> {
  checkHdf5Size(path, start, fileSize)
  const library = await hdf5Library()
  const file = quietly(() => new library.File(path, 'r'))
  if (file.file_id < 0n) {
    throw new LayerRefused('damaged', 'This file begins like NetCDF-4 (HDF5), but its structure cannot be read.', {})
  }
  const descriptor = openSync(path, 'r')
  try {
    const datasets = new Map<string, Dataset>()
    const attributes = reading('its structure', () => {
      collect(library, file, '', 0, datasets)
      return readAttributes(file)
    })
    const variables = [...datasets].flatMap(([name, dataset]) =>
      reading(name, () => describe(name, dataset)) ?? [],
    )
    const kept = new StepCache(mostKeptCells)
    const checked = new Set<string>()
    const datasetOf = ({ name }: RawVariable): Dataset => {
      const dataset = datasets.get(name)!
      if (!checked.has(name)) checkNumbers(name, orNull(() => oddNumbers(descriptor, start, library.Module, file, dataset)))
      checked.add(name)
      return dataset
    }
    // Addresses count from where the file begins; behind a user block the library reads alone.
    const chunks = start === 0 ? openChunkReader(path, library.Module, file) : null
    return {
      format: 'netcdf4',
      variables,
      attributes,
      warnings: [],
      read: (variable, from, count) => readBlock(variable, datasetOf(variable), { kept, chunks }, from, count),
      readWords: (variable, from, count) => readWords(variable, datasetOf(variable), from, count),
      close: () => {
        chunks?.close()
        closeSync(descriptor)
        file.close()
      },
    }
  } catch (error) {
    closeSync(descriptor)
    file.close()
    throw error
  }
}

function collect(
  library: Awaited<ReturnType<typeof hdf5Library>>,
  group: File | Group,
  prefix: string,
  depth: number,
  found: Map<string, Dataset>,
): void {
  for (const key of group.keys()) {
    const entity = group.get(key)
    if (entity instanceof library.Dataset) found.set(prefix + key, entity)
    // Hard links may form circles: depth and number are bounded.
    else if (entity instanceof library.Group && depth < deepestGroup) {
      collect(library, entity, `${prefix}${key}/`, depth + 1, found)
    }
    if (found.size > maxVariables) {
      throw new LayerRefused('too-large', `The file declares more than ${maxVariables} variables.`, {})
    }
  }
}

function checkNumbers(name: string, odd: string | null): void {
  if (odd === null) return
  throw new LayerRefused('unsupported-encoding', `${name} stores ${odd}, which Offing does not read.`, { variable: name, stored: odd })
}

/** null for a dimension that has no variable of its own. */
function describe(name: string, dataset: Dataset): RawVariable | null {
  const { metadata } = dataset
  const shape = metadata.shape ?? []
  const scaleName = dataset.get_scale_name()
  if (scaleName?.startsWith('This is a netCDF dimension but not a netCDF variable')) return null
  const dimensions = shape.map((size, index) => {
    if (scaleName !== null && shape.length === 1) return { name, size }
    const scale = dataset.get_attached_scales(index)[0]
    return { name: scale ? scale.replace(/^\/+/, '') : `unnamed dimension of ${size}`, size }
  })
  return { name, type: numberType(metadata), dimensions, attributes: readAttributes(dataset) }
}

/** Reads a block; where a chunk holds many steps, all of them are unpacked at once and kept for the next step. */
function readBlock(
  variable: RawVariable,
  dataset: Dataset,
  { kept, chunks }: { kept: StepCache; chunks: ChunkReader | null },
  start: number[],
  count: number[],
): Float64Array {
  checkEncoding(variable, dataset)
  const total = count.reduce((product, n) => product * n, 1)
  if (total === 0) return new Float64Array(0)
  if (count.length === 0) return Float64Array.of(Number(reading(variable.name, () => dataset.value)))
  const own = variable.type && chunks?.read(variable.name, variable.type, dataset, start, count)
  if (own) return own
  const wider = stepsTogether(dataset, start, count, total)
  if (!wider) return readBlocks(variable, dataset, start, count, total)
  const key = `${variable.name}\0${wider.start.join()}\0${wider.count.join()}`
  const { axis } = wider
  const steps = wider.count[axis]!
  const all = kept.get(key) ?? readBlocks(variable, dataset, wider.start, wider.count, total * steps)
  kept.set(key, all)
  // The steps' numbers stand `inner` at a time, one step after the other, once for each index of the axes before.
  const inner = count.slice(axis + 1).reduce((product, n) => product * n, 1)
  const step = start[axis]! - wider.start[axis]!
  const values = new Float64Array(total)
  for (let outer = 0; outer < total / inner; outer++) {
    const from = (outer * steps + step) * inner
    values.set(all.subarray(from, from + inner), outer * inner)
  }
  return values
}

/** The block that covers whole chunks along the axis of which one index is wanted; null where that gains nothing. */
function stepsTogether(dataset: Dataset, start: number[], count: number[], total: number) {
  const { chunks, shape } = dataset.metadata
  const axis = count.findIndex((n, d) => n === 1 && (chunks?.[d] ?? 1) > 1 && (shape?.[d] ?? 1) > 1)
  if (!chunks || !shape || axis < 0) return null
  const from = start[axis]! - (start[axis]! % chunks[axis]!)
  const steps = Math.min(chunks[axis]!, shape[axis]! - from)
  if (total * steps > mostKeptCells) return null
  return { axis, start: start.with(axis, from), count: count.with(axis, steps) }
}

function readBlocks(variable: RawVariable, dataset: Dataset, start: number[], count: number[], total: number): Float64Array {
  const values = new Float64Array(total)
  // Blocks run along the first dimension with more than one index, in whole chunks, so no chunk is unpacked twice.
  const along = Math.max(0, count.findIndex((n) => n > 1))
  const perIndex = total / count[along]!
  const chunk = dataset.metadata.chunks?.[along] ?? 1
  const wanted = Math.max(1, Math.floor(blockCells / perIndex))
  const step = Math.max(chunk, wanted - (wanted % chunk))
  let filled = 0
  const end = start[along]! + count[along]!
  for (let from = start[along]!; from < end; ) {
    const to = Math.min(end, from - (from % chunk) + step)
    const ranges = start.map((first, d): [number, number] =>
      d === along ? [from, to] : [first, first + count[d]!],
    )
    const block = reading(variable.name, () => dataset.slice(ranges))
    if (!ArrayBuffer.isView(block)) throw damagedData(variable.name, 'no numbers came back')
    const numbers = block as Float64Array | BigInt64Array
    if (numbers.length > total - filled) throw damagedData(variable.name, 'more numbers came back than were asked for')
    if (numbers instanceof BigInt64Array || numbers instanceof BigUint64Array) {
      for (let i = 0; i < numbers.length; i++) values[filled + i] = Number(numbers[i])
    } else {
      values.set(numbers, filled)
    }
    filled += numbers.length
    from = to
  }
  if (filled !== total) throw damagedData(variable.name, 'fewer numbers came back than were asked for')
  return values
}

function readWords(variable: RawVariable, dataset: Dataset, start: number[], count: number[]) {
  checkEncoding(variable, dataset)
  const block = reading(variable.name, () => dataset.slice(start.map((from, d) => [from, from + count[d]!])))
  if (!(block instanceof BigInt64Array) && !(block instanceof BigUint64Array)) {
    throw damagedData(variable.name, 'no 64-bit numbers came back')
  }
  const low = Uint32Array.from(block, (bits) => Number(bits & 0xffffffffn))
  const high = Uint32Array.from(block, (bits) => Number((bits >> 32n) & 0xffffffffn))
  return { low, high }
}

function checkEncoding(variable: RawVariable, dataset: Dataset): void {
  const filters = reading(variable.name, () => dataset.filters)
  const unknown = filters.find(({ id }) => !knownFilters.has(id))
  if (unknown) {
    throw new LayerRefused(
      'unsupported-encoding',
      `${variable.name} is compressed with a method Offing does not know (${unknown.name || 'no name'}, number ${unknown.id}).`,
      { variable: variable.name, filter: unknown.id },
    )
  }
  const codec = missingCodec(filters)
  if (codec !== null) {
    throw new LayerRefused('unsupported-encoding', `${variable.name} is compressed by Blosc with ${codec}, which Offing does not read.`, {
      variable: variable.name, filter: bloscFilter, codec,
    })
  }
  const { chunks, size } = dataset.metadata
  const chunkBytes = chunks ? chunks.reduce((product, n) => product * n, size) : 0
  if (chunkBytes > maxChunkBytes) {
    throw new LayerRefused('too-large', `${variable.name} is stored in blocks of ${chunkBytes} bytes, too large to unpack.`, {
      variable: variable.name,
      chunkBytes,
      maxChunkBytes,
    })
  }
}

const bloscFilter = 32001
/** Blosc packs with one of several methods, by the seventh of its numbers; its plugin was built without these. */
const missingCodecs: Record<number, string> = { 3: 'Snappy', 4: 'zlib' }

function missingCodec(filters: readonly { id: number; cd_values: number[] }[]): string | null {
  const code = filters.find(({ id }) => id === bloscFilter)?.cd_values[6]
  return code === undefined ? null : (missingCodecs[code] ?? null)
}

/** Reads with errors thrown; whatever the library throws becomes a refusal. */
function reading<T>(what: string, work: () => T): T {
  try {
    return guarded(work)
  } catch (error) {
    if (error instanceof LayerRefused) throw error
    if (error instanceof PointsElsewhere) throw elsewhere(what, error)
    throw damagedData(what, error instanceof Error ? error.message : String(error), error)
  }
}

function elsewhere(what: string, { path }: PointsElsewhere): LayerRefused {
  const sentence = `This file keeps ${what} in another file (${basename(path).slice(0, 100)}), which Offing does not follow. Send it with its data inside.`
  return new LayerRefused('unsupported-encoding', sentence, { what, otherFile: path.slice(0, 300) })
}

function damagedData(what: string, reason: string, cause?: unknown): LayerRefused {
  return new LayerRefused(
    'damaged',
    `The file is damaged: ${what} cannot be read back whole.`,
    { what, reason: reason.slice(0, 300) },
    { cause },
  )
}
