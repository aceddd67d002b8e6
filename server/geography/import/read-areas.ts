import { AreaFileRefused, type AreaFile } from './area-file'
import { areasOfGeojson } from './areas-of-geojson'
import { areasOfKml } from './areas-of-kml'
import { areasOfShapefiles } from './areas-of-shapefile'
import { zipEntries } from './zip-entries'

/** Areas of a file, which is recognised by its first bytes: GeoJSON, KML (also KMZ) or a zipped shapefile. */
export async function readAreas(bytes: Buffer, fileName: string): Promise<AreaFile> {
  if (bytes.length === 0) throw new AreaFileRefused('The file is empty.')
  if (bytes.length > 4 && bytes.readUInt32BE(0) === 0x504b0304) return areasOfZip(bytes, fileName)
  if (bytes.length > 100 && bytes.readInt32BE(0) === 9994) throw new AreaFileRefused('A .shp alone says neither names nor its coordinate system: zip it with its .dbf, .shx and .prj and send the zip.')
  const text = textOf(bytes)
  const start = text.trimStart()
  if (start.startsWith('{')) return areasOfGeojson(text, fileName)
  if (start.startsWith('<')) return areasOfKml(start, fileName)
  throw new AreaFileRefused('The file is neither GeoJSON, nor KML, nor a zipped shapefile.')
}

async function areasOfZip(bytes: Buffer, fileName: string): Promise<AreaFile> {
  const entries = await zipEntries(bytes, (name) => /\.(shp|dbf|prj|cpg|kml)$/i.test(name))
  const names = [...entries.keys()]
  if (names.some((name) => /\.shp$/i.test(name))) return areasOfShapefiles(entries)
  const inside = names.find((name) => /\.kml$/i.test(name))
  if (inside) return areasOfKml(textOf(entries.get(inside)!).trimStart(), fileName)
  throw new AreaFileRefused('The zip holds no .shp (and no .kml): zip the parts of the shapefile themselves.')
}

/** By its byte order mark, else by what an XML declaration says, else UTF-8. */
function textOf(bytes: Buffer): string {
  const mark = bytes.subarray(0, 2).toString('hex')
  const declared = /^\s*<\?xml[^>]*encoding=["']([\w.-]{1,40})["']/.exec(bytes.subarray(0, 200).toString('latin1'))?.[1]
  const encoding = mark === 'fffe' ? 'utf-16le' : mark === 'feff' ? 'utf-16be' : (declared ?? 'utf-8')
  try {
    return new TextDecoder(encoding).decode(bytes)
  } catch {
    throw new AreaFileRefused(`The file says it is written in "${encoding}", which is not known; write it out in UTF-8.`)
  }
}
