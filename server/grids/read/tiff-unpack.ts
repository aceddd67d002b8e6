import { inflateSync } from 'node:zlib'
import { ZSTDDecoder } from 'zstddec'

/** None, LZW, deflate (two numbers), packbits, ZSTD. JPEG and WebP lose values; LERC is not read. */
export const tiffCompressions: ReadonlySet<number> = new Set([1, 5, 8, 32946, 32773, 50000])

const zstd = new ZSTDDecoder()

/** Loads what a compression needs before its blocks can be unpacked in one go. */
export async function prepareUnpacking(compression: number): Promise<void> {
  if (compression === 50000) await zstd.init()
}

/**
 * Unpacks one block. It never becomes longer than `wholeBytes`, whatever it holds: more is an error, and so is a
 * stream that does not end properly (deflate's own checksum included).
 */
export function unpackBlock(packed: Buffer, compression: number, wholeBytes: number): Uint8Array {
  if (compression === 1) return packed.subarray(0, wholeBytes)
  if (compression === 5) return unpackLzw(packed, wholeBytes)
  if (compression === 32773) return unpackPackbits(packed, wholeBytes)
  if (compression === 50000) {
    // In one go the library shows an error as an empty result; its stream form waits for ever on damaged blocks.
    const unpacked = zstd.decode(packed, wholeBytes)
    if (unpacked.length === 0 || unpacked.length > wholeBytes) throw new Error('a ZSTD block does not unpack')
    return unpacked
  }
  return inflateSync(packed, { maxOutputLength: Math.max(1, wholeBytes) })
}

/** Packbits: a count, then so many bytes as they are, or one byte so many times. */
function unpackPackbits(packed: Buffer, wholeBytes: number): Uint8Array {
  const out = new Uint8Array(wholeBytes)
  let filled = 0
  for (let at = 0; at < packed.length && filled < wholeBytes; ) {
    const head = packed.readInt8(at++)
    if (head === -128) continue
    const count = head >= 0 ? head + 1 : 1 - head
    if (filled + count > wholeBytes) throw new Error('a packbits block is longer than it may be')
    if (head >= 0) {
      if (at + count > packed.length) throw new Error('a packbits block ends early')
      out.set(packed.subarray(at, at + count), filled)
      at += count
    } else {
      if (at >= packed.length) throw new Error('a packbits block ends early')
      out.fill(packed[at++]!, filled, filled + count)
    }
    filled += count
  }
  return out.subarray(0, filled)
}

const [clearCode, endCode, firstFree, tableSize] = [256, 257, 258, 4096]

/** TIFF's LZW: codes of 9 to 12 bits, most significant first, widened one code early. */
function unpackLzw(packed: Buffer, wholeBytes: number): Uint8Array {
  if (packed[0] === 0 && (packed[1]! & 1) === 1) throw new Error('LZW in the bit order of before 1988')
  const out = new Uint8Array(wholeBytes)
  // Each entry is a run of bytes that already stands in the output: where it begins, and its length.
  const [starts, lengths] = [new Int32Array(tableSize), new Int32Array(tableSize)]
  let [filled, free, width, bits, held, previous] = [0, firstFree, 9, 0, 0, -1]
  for (let at = 0; ; ) {
    while (bits < width && at < packed.length) {
      held = ((held << 8) | packed[at++]!) & 0xffffff
      bits += 8
    }
    if (bits < width) break
    const code = (held >> (bits - width)) & ((1 << width) - 1)
    bits -= width
    if (code === endCode) break
    if (code === clearCode) {
      ;[free, width, previous] = [firstFree, 9, -1]
      continue
    }
    if (code > free || (code === free && previous < 0)) throw new Error('an LZW block names an unknown code')
    // A code that is only just being made is the previous run and its own first byte again.
    const known = code < free
    const length = code < 256 ? 1 : known ? lengths[code]! : lengths[free]!
    if (filled + length > wholeBytes) throw new Error('an LZW block is longer than it may be')
    if (code < 256) out[filled] = code
    else {
      const from = known ? starts[code]! : starts[free]!
      for (let i = 0; i < length; i++) out[filled + i] = out[from + i]!
    }
    // The entry that will be made next: this run and one byte more, which the next code brings.
    if (previous >= 0 && free < tableSize) free++
    if (free < tableSize) {
      starts[free] = filled
      lengths[free] = length + 1
    }
    previous = code
    filled += length
    if (free + 1 >= 1 << width && width < 12) width++
  }
  return out.subarray(0, filled)
}
