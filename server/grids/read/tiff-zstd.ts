import { addDecoder, BaseDecoder, type GeoTIFFImage } from 'geotiff'
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
  const load = async () => {
    await library.init()
    return TiffZstdDecoder
  }
  addDecoder(50000, load, parametersOf)
}

/** The size of a block as it is stored: the parameters geotiff gives by itself leave the number of samples out. */
async function parametersOf(directory: GeoTIFFImage['fileDirectory']) {
  const height = await directory.loadValue('ImageLength')
  return {
    tileWidth: (await directory.loadValue('TileWidth')) ?? (await directory.loadValue('ImageWidth')) ?? 0,
    tileHeight: (await directory.loadValue('TileLength')) ?? Math.min(height ?? 0, (await directory.loadValue('RowsPerStrip')) ?? Infinity),
    predictor: (await directory.loadValue('Predictor')) ?? 1,
    bitsPerSample: (await directory.loadValue('BitsPerSample')) ?? 8,
    planarConfiguration: (await directory.loadValue('PlanarConfiguration')) ?? 1,
    samplesPerPixel: (await directory.loadValue('SamplesPerPixel')) ?? 1,
  }
}
