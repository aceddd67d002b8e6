import { addDecoder, BaseDecoder } from 'geotiff'
import { ZSTDDecoder } from 'zstddec'

const library = new ZSTDDecoder()

/**
 * ZSTD blocks of TIFF files, unpacked in one go. The decoder that geotiff brings works in a stream and waits for ever
 * on damaged blocks; in one go the library answers an error, which shows as an empty result.
 */
class TiffZstdDecoder extends BaseDecoder {
  override decodeBlock(buffer: ArrayBufferLike): ArrayBufferLike {
    const { tileWidth, tileHeight, bitsPerSample, planarConfiguration, samplesPerPixel = 1 } = this.parameters
    const bits = typeof bitsPerSample === 'number' ? bitsPerSample : (bitsPerSample[0] ?? 8)
    const samples = planarConfiguration === 2 ? 1 : samplesPerPixel
    const wholeBytes = Math.ceil((tileWidth * bits * samples) / 8) * tileHeight
    const unpacked = library.decode(new Uint8Array(buffer), wholeBytes)
    if (unpacked.length === 0 || unpacked.length > wholeBytes) throw new Error('a ZSTD block does not unpack')
    return unpacked.buffer
  }
}

let registered = false

export function useOwnZstdDecoder(): void {
  if (registered) return
  registered = true
  addDecoder(50000, async () => {
    await library.init()
    return TiffZstdDecoder
  })
}
