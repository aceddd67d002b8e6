import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { Worker } from 'node:worker_threads'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { bundleReader } from './bundle-reader'
import type { Outcome } from './reader-process'

const reference = new URL('../../reference/grids/', import.meta.url).pathname
const runs = process.env['CI'] ? 500 : 60
const deadlineMs = 20_000

let folder: string
let bundle: string
let worker: Worker | null = null
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-hurt-'))
  bundle = await bundleReader()
})
afterAll(async () => {
  await worker?.terminate()
  await rm(folder, { recursive: true })
  await rm(bundle, { force: true })
})

/** Reads a file in a worker; a hang and a crash of the worker are outcomes of their own. */
async function read(path: string): Promise<Outcome | { hung: true }> {
  worker ??= new Worker(bundle)
  const reader = worker
  const outcome = await new Promise<Outcome | { hung: true }>((resolve) => {
    const timer = setTimeout(() => resolve({ hung: true }), deadlineMs)
    const settle = (result: Outcome) => {
      clearTimeout(timer)
      resolve(result)
    }
    reader.once('message', settle)
    reader.once('error', (error) => settle({ fault: String(error) }))
    reader.postMessage(path)
  })
  reader.removeAllListeners('message').removeAllListeners('error')
  if ('hung' in outcome || 'fault' in outcome) {
    worker = null
    await reader.terminate()
  }
  return outcome
}

/** A small generator with a fixed seed: the same bytes are hurt in every run. */
function numbers(seed: number): () => number {
  let state = (seed * 2654435761) >>> 0 || 1
  return () => {
    state ^= state << 13
    state ^= state >>> 17
    state ^= state << 5
    return (state >>> 0) / 2 ** 32
  }
}

type Hurt = (bytes: Buffer, next: () => number) => Buffer

/** One to four flipped bits or changed bytes, most of them near the front where headers are; every fifth file is cut. */
const anywhere: Hurt = (bytes, next) => {
  if (next() < 0.2) return bytes.subarray(0, Math.floor(next() * bytes.length))
  for (let i = Math.ceil(next() * 4); i > 0; i--) {
    const at = Math.floor(next() * bytes.length * (next() < 0.6 ? 0.2 : 1))
    if (next() < 0.5) bytes[at]! ^= 1 << Math.floor(next() * 8)
    else bytes[at] = Math.floor(next() * 256)
  }
  return bytes
}

const inside = (from: number, to: number): Hurt => (bytes, next) => {
  bytes[from + Math.floor(next() * (to - from))]! ^= 1 << Math.floor(next() * 8)
  return bytes
}

async function hurtMany(name: string, hurt: Hurt, check: (outcome: Outcome, whole: Float64Array[]) => void): Promise<Map<string, number>> {
  const original = await readFile(reference + name)
  // Each under a name of its own, as the server stores them: HDF5 goes on holding a file that failed inside it.
  const readContent = async (content: Buffer, place: string) => {
    const path = join(folder, `${place}-${name}`)
    await writeFile(path, content)
    const outcome = await read(path)
    await rm(path)
    return outcome
  }
  const whole = (await readContent(original, 'whole')) as { values: Float64Array[] }
  expect(whole.values.length).toBeGreaterThan(0)
  const counts = new Map<string, number>()
  for (let seed = 1; seed <= runs; seed++) {
    const outcome = await readContent(hurt(Buffer.from(original), numbers(seed)), String(seed))
    if ('hung' in outcome || 'fault' in outcome) throw new Error(`${name}, seed ${seed}: ${'fault' in outcome ? outcome.fault : 'no end'}`)
    check(outcome, whole.values)
    // One thread reads them all, as in the server: what a hurt file leaves behind must not touch the next good one.
    if (seed % 20 === 0) expect(await readContent(original, `again-${seed}`), `${name} after seed ${seed}`).toEqual(whole)
    const kind = 'refused' in outcome ? outcome.refused : 'read'
    counts.set(kind, (counts.get(kind) ?? 0) + 1)
  }
  return counts
}

describe.sequential('a valid file that was hurt', () => {
  it.each([
    'classic-float.nc', 'cdf5-double.nc', 'nc4-packed-int16.nc', 'nc4-curvilinear.nc', 'tiff-float32-deflate-predictor3-tiled.tif',
    'tiff-int16-scaled-lzw-predictor2.tif', 'tiff-big-float64-zstd.tif', 'bigtiff-big-endian-float32-deflate.tif',
  ])('%s is read or refused, and never hangs or fails otherwise', async (name) => {
    const counts = await hurtMany(name, anywhere, () => undefined)
    expect(counts.get('read')).toBeGreaterThan(0)
    expect(counts.size).toBeGreaterThan(1)
  }, 600_000)

  const right = (outcome: Outcome, whole: Float64Array[]) => {
    if ('values' in outcome) expect(outcome.values).toEqual(whole)
  }

  it('gives the right numbers or a refusal where gzip carries a checksum of everything', async () => {
    const counts = await hurtMany('classic-float.nc.gz', anywhere, right)
    expect(counts.get('damaged')).toBeGreaterThan(runs / 3)
  }, 600_000)

  it('gives the right numbers or a refusal where newer HDF5 carries checksums of structure and data', async () => {
    const counts = await hurtMany('h5-latest-single-chunk.h5', anywhere, right)
    expect(counts.get('damaged')).toBeGreaterThan(runs / 4)
  }, 600_000)

  it('gives the right numbers or a refusal where the blocks of a TIFF file are deflated', async () => {
    const bytes = await readFile(`${reference}tiff-float32-deflate-predictor3-tiled.tif`)
    const at = bytes.indexOf(Buffer.from([0x78, 0x9c]))
    expect(at).toBeGreaterThan(0)
    const counts = await hurtMany('tiff-float32-deflate-predictor3-tiled.tif', inside(at, at + 600), right)
    expect(counts.get('damaged')).toBeGreaterThan(runs / 2)
  }, 600_000)
})
