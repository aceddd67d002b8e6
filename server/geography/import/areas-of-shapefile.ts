import type { Geometry, Position } from 'geojson'
import { parseDbf, parseShp } from 'shpjs'
import { AreaFileRefused, areaName, mostAreas, type AreaFile, type FoundArea } from './area-file'
import { degreesFrom, type ToDegrees } from './degrees-from'

/** Areas of the shapefiles in a zip, by the names of its entries. */
export function areasOfShapefiles(entries: ReadonlyMap<string, Buffer>): AreaFile {
  const byName = new Map([...entries].map(([name, bytes]) => [name.toLowerCase(), bytes]))
  const notes: string[] = []
  const areas = [...entries.keys()].filter((name) => /\.shp$/i.test(name)).flatMap((name) => {
    const beside = (ending: string) => byName.get(`${name.slice(0, -4).toLowerCase()}.${ending}`)
    return areasOf(name, entries.get(name)!, beside, notes)
  })
  if (areas.length === 0) throw new AreaFileRefused('The shapefile holds no shape.')
  if (areas.length > mostAreas) throw new AreaFileRefused(`The shapefile holds ${areas.length.toLocaleString('en-GB')} shapes; at most ${mostAreas} can be read at once.`)
  return { format: 'shapefile', notes: [...new Set(notes)], areas }
}

function areasOf(name: string, shp: Buffer, beside: (ending: string) => Buffer | undefined, notes: string[]): FoundArea[] {
  checkRecords(name, shp)
  const shapes = parsed(name, shp)
  const prj = beside('prj')?.toString('utf8').trim()
  const toDegrees = prj ? degreesFrom(prj) : null
  if (!prj) {
    if (!withinDegrees(shp)) throw new AreaFileRefused(`${name} has no .prj beside it, and its coordinates are no longitudes and latitudes: send the .prj with it.`)
    notes.push(`${name} has no .prj beside it; its coordinates were taken as longitude and latitude in WGS84.`)
  }
  if (toDegrees?.note) notes.push(`${name}: ${toDegrees.note}`)
  const rows = rowsOf(beside('dbf'), beside('cpg'), shapes.length)
  return shapes.map((shape, i) => ({
    name: areaName(rows[i], null, name, i, shapes.length),
    geometry: shape === null ? { type: 'Feature', geometry: null } : toDegrees ? moved(shape, toDegrees.place) : shape,
  }))
}

/** Every record header leads on and stays within the file; the reader of shapes trusts them. */
function checkRecords(name: string, shp: Buffer): void {
  const damaged = () => new AreaFileRefused(`${name} is damaged or cut off: its records do not fit into it.`)
  if (shp.length < 100 || shp.readInt32BE(0) !== 9994) throw new AreaFileRefused(`${name} is no shapefile: its first bytes say so.`)
  const type = shp.readInt32LE(32)
  if (![5, 15, 25].includes(type)) throw new AreaFileRefused(`${name} holds ${type % 10 === 3 ? 'lines' : type === 31 ? 'surfaces' : 'points'}, not areas.`)
  for (let at = 100; at < shp.length; ) {
    if (at + 12 > shp.length) throw damaged()
    const length = shp.readInt32BE(at + 4) * 2
    if (length < 4 || at + 8 + length > shp.length) throw damaged()
    at += 8 + length
  }
}

function parsed(name: string, shp: Buffer): (Geometry | null)[] {
  try {
    return parseShp(shp)
  } catch {
    throw new AreaFileRefused(`${name} is damaged: a shape in it cannot be read.`)
  }
}

/** Attributes by place; none where the table does not fit its own header. */
function rowsOf(dbf: Buffer | undefined, cpg: Buffer | undefined, shapes: number): (Record<string, unknown> | undefined)[] {
  if (!dbf || dbf.length < 33) return []
  const [records, headerLength, recordLength] = [dbf.readUInt32LE(4), dbf.readUInt16LE(8), dbf.readUInt16LE(10)]
  if (headerLength < 33 || recordLength < 1 || records < shapes || headerLength + records * recordLength > dbf.length + 1) return []
  try {
    return parseDbf(dbf, cpg)
  } catch {
    return []
  }
}

function withinDegrees(shp: Buffer): boolean {
  const [west, south, east, north] = [36, 44, 52, 60].map((at) => shp.readDoubleLE(at))
  return Math.max(Math.abs(west!), Math.abs(east!)) <= 360 && Math.max(Math.abs(south!), Math.abs(north!)) <= 90
}

function moved(shape: Geometry, place: ToDegrees['place']): Geometry {
  const ring = (points: Position[]) => points.map(([x = NaN, y = NaN]) => place(x, y))
  if (shape.type === 'Polygon') return { ...shape, coordinates: shape.coordinates.map(ring) }
  if (shape.type === 'MultiPolygon') return { ...shape, coordinates: shape.coordinates.map((rings) => rings.map(ring)) }
  return shape
}
