import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { gzipSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import { LayerRefused } from '../../../server/grids/layer-refused'
import { inspectGrid } from '../../../server/grids/inspect'

/** Made by tests/reference/make/filters.py with h5py and PyTables; both read all but the damaged one without complaint. */
const folder = new URL('../../reference/refused/', import.meta.url).pathname

async function refusalOf(name: string): Promise<LayerRefused> {
  const reason: unknown = await inspectGrid(folder + name, name).then(
    () => `${name} was read`,
    (error: unknown) => error,
  )
  expect(reason).toBeInstanceOf(LayerRefused)
  return reason as LayerRefused
}

describe('an HDF5 file whose data lie in another file of this machine', () => {
  it.each([
    ['h5-external-storage.h5', 'chlor_a', 'package.json'],
    ['h5-external-link.h5', 'its structure', 'h5-lzf.h5'],
    ['h5-virtual.h5', 'chlor_a', 'h5-contiguous.h5'],
  ])('%s is refused, and the other file is never opened', async (name, what, other) => {
    const refused = await refusalOf(name)
    expect(refused.code).toBe('unsupported-encoding')
    expect(refused.message).toBe(`This file keeps ${what} in another file (${other}), which Offing does not follow. Send it with its data inside.`)
    expect(refused.facts).toMatchObject({ what, otherFile: expect.stringContaining(other) })
  })

  it('would otherwise have shown what that file holds', async () => {
    // The test means something only as long as the file it points at is there.
    expect((await readFile('package.json')).length).toBeGreaterThan(672)
  })
})

describe('an HDF5 file that is packed in a way that is not read', () => {
  it.each([
    ['h5-lzo.h5', 'chlor_a is compressed with a method Offing does not know (lzo, number 305).', { variable: 'chlor_a', filter: 305 }],
    ['h5-unknown-filter.h5', 'chlor_a is compressed with a method Offing does not know (no name, number 32999).', { variable: 'chlor_a', filter: 32999 }],
    ['h5-blosc-zlib.h5', 'chlor_a is compressed by Blosc with zlib, which Offing does not read.', { variable: 'chlor_a', filter: 32001, codec: 'zlib' }],
    ['h5-nbit-17-bits.h5', 'chlor_a stores numbers of 17 bits in 32, which Offing does not read.', { variable: 'chlor_a', stored: 'numbers of 17 bits in 32' }],
  ])('%s is refused by the name of it', async (name, message, facts) => {
    expect(await refusalOf(name)).toMatchObject({ code: 'unsupported-encoding', message, facts })
  })

  it('is refused when a chunk does not match its Fletcher checksum, though it has the right length', async () => {
    expect(await refusalOf('h5-fletcher32-damaged.h5')).toMatchObject({
      code: 'damaged',
      message: 'The file is damaged: chlor_a cannot be read back whole.',
      facts: { what: 'chlor_a', reason: expect.stringMatching(/\S/) },
    })
  })
})

describe('an HDF5 file packed by gzip', () => {
  it('is refused for numbers of odd widths as it would be unpacked', async () => {
    const own = await mkdtemp(join(tmpdir(), 'offing-gzip-'))
    try {
      const path = join(own, 'narrow.h5.gz')
      await writeFile(path, gzipSync(await readFile(`${folder}h5-nbit-17-bits.h5`)))
      await expect(inspectGrid(path, 'narrow.h5.gz')).rejects.toThrow('chlor_a stores numbers of 17 bits in 32, which Offing does not read.')
    } finally {
      await rm(own, { recursive: true })
    }
  })
})
