import { inflateSync } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import { LayerRefused } from '../../../server/grids/layer-refused'
import { orNull } from '../../../server/grids/read/hdf5-chunks'

describe('what a damaged file makes of the chunk reader', () => {
  it.each([
    ['a refusal', () => { throw new LayerRefused('truncated', 'It ends early.') }],
    ['a read past the end of a block', () => Buffer.alloc(2).readUInt32LE(0)],
    ['an impossible length', () => Buffer.alloc(-1)],
    ['bytes that zlib cannot unpack', () => inflateSync(Buffer.from('not deflated'))],
    ['more bytes than they may be', () => inflateSync(Buffer.from('eJxLTBwFAA4bBhk=', 'base64'), { maxOutputLength: 1 })],
  ])('%s is left to the library', (_, work) => expect(orNull<unknown>(work)).toBeNull())

  it('a fault of its own is not hidden', () => {
    expect(() => orNull(() => (undefined as unknown as number[]).length)).toThrow(TypeError)
    expect(() => orNull(() => { throw new Error('a fault') })).toThrow('a fault')
  })
})
