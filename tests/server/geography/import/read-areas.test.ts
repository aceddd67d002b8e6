import { readFileSync } from 'node:fs'
import { deflateRawSync, crc32 } from 'node:zlib'
import type { Position } from 'geojson'
import { describe, expect, it } from 'vitest'
import { readAreas } from '../../../../server/geography/import/read-areas'
import { checkOutline } from '../../../../server/geography/outline/check-outline'

const reference = (name: string) => readFileSync(new URL(`../../../reference/outlines/${name}`, import.meta.url))
const read = (text: string | Buffer, name = 'bay.geojson') => readAreas(Buffer.from(text), name)
const refusal = async (text: string | Buffer, name?: string) => read(text, name).then(() => 'read', (error: Error) => error.message)
const corners = (geometry: { coordinates: unknown }) => (geometry.coordinates as unknown[]).flat(3).map(Number)

/** A zip of one entry, its sizes as claimed. */
function zipOf(name: string, data: Buffer, claimed = data.length): Buffer {
  const packed = deflateRawSync(data, { level: 9 })
  const fields = (central: boolean) => {
    const head = Buffer.alloc(central ? 46 : 30)
    head.writeUInt32LE(central ? 0x02014b50 : 0x04034b50, 0)
    const at = central ? 6 : 4
    head.writeUInt16LE(20, at)
    head.writeUInt16LE(8, at + 4)
    head.writeUInt32LE(crc32(data), at + 10)
    head.writeUInt32LE(packed.length, at + 14)
    head.writeUInt32LE(claimed, at + 18)
    head.writeUInt16LE(name.length, at + 22)
    return Buffer.concat([head, Buffer.from(name)])
  }
  const [local, central] = [fields(false), fields(true)]
  const end = Buffer.alloc(22)
  end.writeUInt32LE(0x06054b50, 0)
  end.writeUInt16LE(1, 8)
  end.writeUInt16LE(1, 10)
  end.writeUInt32LE(central.length, 12)
  end.writeUInt32LE(local.length + packed.length, 16)
  return Buffer.concat([local, packed, central, end])
}

describe('a file of areas', () => {
  // Written by GDAL 3.6.2 (tests/reference/make/outlines.sh).
  const original = JSON.parse(reference('bays.geojson').toString()) as { features: { properties: { name: string }; geometry: { type: string; coordinates: Position[][] } }[] }

  it.each(['bays.geojson', 'bays.kml', 'bays-4326.zip', 'bays-32629.zip', 'bays-3035.zip'])('%s by GDAL gives the same two areas under their names', async (name) => {
    const { areas } = await readAreas(reference(name), name)
    expect(areas.map((area) => area.name)).toEqual(['Fjord of Ålesund', 'Two parts'])
    for (const [i, area] of areas.entries()) {
      const [found, expected] = [checkOutline(area.geometry), checkOutline(original.features[i]!.geometry)]
      expect(found.geometry.type).toBe(expected.geometry.type)
      expect(Math.abs(found.areaKm2 / expected.areaKm2 - 1)).toBeLessThan(2e-9)
      const sorted = (geometry: { coordinates: unknown }) => [...new Set(corners(geometry).map((value) => value.toFixed(6)))].sort()
      expect(sorted(found.geometry)).toEqual(sorted(expected.geometry))
    }
  })

  it('says what its corners were brought from', async () => {
    expect((await readAreas(reference('bays-32629.zip'), 'x.zip')).notes).toEqual(['bays.shp: corners were brought from WGS_1984_UTM_Zone_29N to longitude and latitude in WGS84.'])
    expect(await readAreas(reference('bays-4326.zip'), 'x.zip')).toMatchObject({ format: 'shapefile', notes: [] })
  })

  it('takes the polygons of a collection as one area, and numbers what has no name', async () => {
    const square = (west: number) => ({ type: 'Polygon', coordinates: [[[west, 50], [west + 1, 50], [west + 1, 51], [west, 50]]] })
    const both = { type: 'GeometryCollection', geometries: [square(-14), square(-12), { type: 'Point', coordinates: [-13, 50] }] }
    const { areas } = await read(JSON.stringify({ type: 'FeatureCollection', features: [{ type: 'Feature', properties: null, geometry: both }, square(-9)] }), 'C:\\data\\west.geojson')
    expect(areas).toMatchObject([{ name: 'west 1', geometry: { type: 'MultiPolygon' }, repairs: ['Points and lines beside the area were left out.'] }, { name: 'west 2', geometry: { type: 'Polygon' } }])
  })

  it('is read with a byte order mark and in the encoding its declaration names', async () => {
    expect((await read(`\ufeff${reference('bays.geojson').toString()}`)).areas).toHaveLength(2)
    const latin = Buffer.from(reference('bays.kml').toString().replace('utf-8', 'ISO-8859-1'), 'latin1')
    expect((await read(latin)).areas[0]!.name).toBe('Fjord of Ålesund')
  })

  it.each<[string, string | Buffer, string | RegExp]>([
    ['empty', '', 'The file is empty.'],
    ['text', 'here', 'The file is neither GeoJSON, nor KML, nor a zipped shapefile.'],
    ['cut off JSON', '{"type":"FeatureCollection","features":[', /^The file starts like GeoJSON but cannot be read to its end/],
    ['other JSON', '{"a":1}', 'The file is JSON, but not GeoJSON: it names no type.'],
    ['no feature', '{"type":"FeatureCollection","features":[]}', 'The file holds no feature.'],
    ['too many features', JSON.stringify({ type: 'FeatureCollection', features: Array.from({ length: 501 }, () => null) }), 'The file holds 501 features; at most 500 can be read at once.'],
    ['another coordinate system', '{"type":"FeatureCollection","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:EPSG::25832"}},"features":[1]}', /^The coordinates of this GeoJSON are in urn:ogc:def:crs:EPSG::25832/],
    ['cut off KML', '<kml><Placemark><name>a</name>', /well-formed XML|no placemark/],
    ['other XML', '<?xml version="1.0"?><gpx/>', 'The file is XML but no KML: its first element is "gpx".'],
    ['deep nesting', `<kml>${'<a>'.repeat(200_000)}`, /nested more than 100 deep/],
    ['an entity bomb', '<!DOCTYPE kml [<!ENTITY a "aaaaaaaaaa"><!ENTITY b "&a;&a;&a;&a;&a;&a;&a;&a;&a;&a;">]><kml><Placemark><name>&b;</name></Placemark></kml>', /^The file declares a document type or entities/],
    ['an external entity', '<?xml version="1.0"?><!DOCTYPE kml SYSTEM "file:///etc/passwd"><kml/>', /^The file declares a document type or entities/],
    ['an entity bomb in UTF-16', Buffer.from('\ufeff<!DOCTYPE kml [<!ENTITY a "a">]><kml/>', 'utf16le'), /^The file declares a document type or entities/],
    ['a zip without shapes', zipOf('a.txt', Buffer.from('a')), /^The zip holds no \.shp/],
    ['a cut off zip', reference('bays-4326.zip').subarray(0, 500), 'The zip is damaged or cut off.'],
    ['a zip bomb', zipOf('a.shp', Buffer.alloc(80 * 1024 * 1024)), 'The zip unfolds to more than 64 MB; nothing of it was kept.'],
    ['a zip bomb that lies about its size', zipOf('a.shp', Buffer.alloc(80 * 1024 * 1024), 1000), 'The zip is damaged or cut off.'],
    ['a shapefile of zeros', zipOf('a.shp', Buffer.alloc(200)), 'a.shp is no shapefile: its first bytes say so.'],
    ['a shapefile alone', Buffer.concat([Buffer.from([0, 0, 0x27, 0x0a]), Buffer.alloc(200)]), /^A \.shp alone says neither names/],
  ])('%s is refused with a sentence', async (_, bytes, expected) => {
    if (typeof expected === 'string') expect(await refusal(bytes)).toBe(expected)
    else expect(await refusal(bytes)).toMatch(expected)
  })

  it('is refused where records of a shapefile lead back or out of it', async () => {
    const shp = Buffer.alloc(300)
    shp.writeInt32BE(9994, 0)
    shp.writeInt32LE(5, 32)
    for (const words of [-4, 0, 1_000_000]) {
      shp.writeInt32BE(words, 104)
      expect(await refusal(zipOf('bay.shp', Buffer.from(shp)))).toBe('bay.shp is damaged or cut off: its records do not fit into it.')
    }
  })

  it('is refused without .prj where its numbers are no degrees, and where the .prj is not understood', async () => {
    const shp = Buffer.alloc(112)
    shp.writeInt32BE(9994, 0)
    shp.writeInt32LE(5, 32)
    shp.writeDoubleLE(500_000, 36)
    shp.writeInt32BE(2, 104)
    expect(await refusal(zipOf('utm.shp', shp))).toMatch(/^utm.shp has no .prj beside it, and its coordinates are no longitudes/)
  })

  it('that holds points or lines says so, feature by feature', async () => {
    const { areas } = await read('{"type":"FeatureCollection","features":[{"type":"Feature","properties":{"name":"buoy"},"geometry":{"type":"Point","coordinates":[1,2]}}]}')
    expect(areas[0]).toMatchObject({ name: 'buoy', geometry: { type: 'Point' } })
    expect(() => checkOutline(areas[0]!.geometry)).toThrow('not a Point')
  })
})
