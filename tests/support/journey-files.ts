import { join } from 'node:path'
import { writeGeotiff } from '../../server/grids/write/geotiff'
import type { GridFile, GridFileVariable } from '../../server/grids/write/grid-file'
import { writeNetcdfClassic } from '../../server/grids/write/netcdf-classic'
import { writeNetcdf4 } from '../../server/grids/write/netcdf4'
import type { Region } from '../../shared/schemas/regions'

export interface Box {
  west: number
  south: number
  east: number
  north: number
}

export interface Wish {
  box: Box
  /** Noon UTC of each day, YYYY-MM-DD. */
  days: readonly string[]
  /** mg m-3, the same all over the grid: what a region must come out with can be said beforehand. */
  value: (day: number) => number
  variable: string
}

const side = 24

const chlorophyll = { standard_name: 'mass_concentration_of_chlorophyll_a_in_sea_water', units: 'mg m-3' }

/** A survey's chlorophyll on 24 x 24 cells over a box, as classic NetCDF, NetCDF-4 or GeoTIFF; answers its path. */
export async function writeSurvey(folder: string, name: string, format: 'classic' | 'netcdf4' | 'geotiff', wish: Wish): Promise<string> {
  const path = join(folder, name)
  if (format === 'classic') await writeNetcdfClassic(path, gridFileOf(wish))
  else if (format === 'netcdf4') await writeNetcdf4(path, { ...gridFileOf(wish), deflate: 4 })
  else await writePicture(path, wish)
  return path
}

function gridFileOf({ box, days, value, variable }: Wish): GridFile {
  const cells = side * side
  const data = new Float64Array(days.length * cells)
  days.forEach((_, day) => data.fill(value(day), day * cells, (day + 1) * cells))
  const survey: GridFileVariable = { name: variable, dtype: 'f4', data, attributes: { long_name: 'chlorophyll-a of a survey', ...chlorophyll } }
  return gridOver(box, side, days, [survey])
}

function gridOver(box: Box, size: number, days: readonly string[], variables: GridFileVariable[]): GridFile {
  return {
    latitudes: Float64Array.from({ length: size }, (_, row) => box.north - ((row + 0.5) * (box.north - box.south)) / size),
    longitudes: Float64Array.from({ length: size }, (_, column) => box.west + ((column + 0.5) * (box.east - box.west)) / size),
    times: days.map((day) => Date.parse(`${day}T12:00:00Z`)),
    variables,
    globalAttributes: { title: 'survey for a test', processing_version: 'S1' },
  }
}

/** Columns in twenty that carry each flag: a fifth, a tenth and a quarter of the cells, none of them twice. */
const flaggedColumns = { CLOUD: [8, 9, 10, 11], STRAYLIGHT: [0, 19], BRIGHT_WATER: [3, 4, 5, 14, 15] }

/** Chlorophyll of one day, the same all over, with three quality flags on 20 x 20 cells; NetCDF-4. Answers its path. */
export async function writeFlagged(folder: string, name: string, { box, day, value }: { box: Box; day: string; value: number }): Promise<string> {
  const size = 20
  const cells = size * size
  const maskAt = (column: number) => Object.values(flaggedColumns).reduce((mask, columns, bit) => mask + (columns.includes(column) ? 2 ** bit : 0), 0)
  const variables: GridFileVariable[] = [
    { name: 'chl_harbour', dtype: 'f4', data: new Float64Array(cells).fill(value), attributes: { ...chlorophyll, ancillary_variables: 'quality' } },
    {
      name: 'quality',
      dtype: 'u1',
      data: Float64Array.from({ length: cells }, (_, cell) => maskAt(cell % size)),
      attributes: { flag_masks: '1b, 2b, 4b', flag_meanings: Object.keys(flaggedColumns).join(' ') },
    },
  ]
  const path = join(folder, name)
  await writeNetcdf4(path, { ...gridOver(box, size, [day], variables), deflate: 4 })
  return path
}

/** Reflectances of one day by their wavelength in nm, each the same all over; NetCDF-4. Answers its path. */
export async function writeBands(folder: string, name: string, { box, day, rrs }: { box: Box; day: string; rrs: Record<number, number> }): Promise<string> {
  const variables = Object.entries(rrs).map(([nm, value]): GridFileVariable => {
    const attributes = { units: 'sr-1', long_name: `Remote sensing reflectance at ${nm} nm` }
    return { name: `Rrs_${nm}`, dtype: 'f4', data: new Float64Array(side * side).fill(value), attributes }
  })
  const path = join(folder, name)
  await writeNetcdf4(path, { ...gridOver(box, side, [day], variables), deflate: 4 })
  return path
}

/** A box with room to spare round a region, so that its grid sees the whole of it. */
export function boxAround({ type, coordinates }: Region['geometry']): Box {
  const positions = type === 'Polygon' ? coordinates.flat() : coordinates.flat(2)
  const longitudes = positions.map(([longitude = Number.NaN]) => longitude)
  const latitudes = positions.map(([, latitude = Number.NaN]) => latitude)
  return { west: Math.min(...longitudes) - 0.02, east: Math.max(...longitudes) + 0.02, south: Math.min(...latitudes) - 0.02, north: Math.max(...latitudes) + 0.02 }
}

/** A picture that tells neither its time nor its feed. */
async function writePicture(path: string, { box, value, variable }: Wish): Promise<void> {
  await writeGeotiff(path, {
    rows: side,
    columns: side,
    west: box.west,
    north: box.north,
    lonStep: (box.east - box.west) / side,
    latStep: (box.north - box.south) / side,
    values: new Float64Array(side * side).fill(value(0)),
    noData: -9999,
    deflate: true,
    description: variable,
    unit: 'mg m-3',
    metadata: { processing_version: 'S1' },
  })
}

/** Days in a row, the first of them given. */
export function daysFrom(first: string, count: number): string[] {
  return Array.from({ length: count }, (_, day) => new Date(Date.parse(`${first}T00:00:00Z`) + day * 86_400_000).toISOString().slice(0, 10))
}
