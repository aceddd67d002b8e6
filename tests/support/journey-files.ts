import { join } from 'node:path'
import { writeGeotiff } from '../../server/grids/write/geotiff'
import type { GridFile } from '../../server/grids/write/grid-file'
import { writeNetcdfClassic } from '../../server/grids/write/netcdf-classic'
import { writeNetcdf4 } from '../../server/grids/write/netcdf4'

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
  return {
    latitudes: Float64Array.from({ length: side }, (_, row) => box.north - ((row + 0.5) * (box.north - box.south)) / side),
    longitudes: Float64Array.from({ length: side }, (_, column) => box.west + ((column + 0.5) * (box.east - box.west)) / side),
    times: days.map((day) => Date.parse(`${day}T12:00:00Z`)),
    variables: [
      {
        name: variable,
        dtype: 'f4',
        data,
        attributes: { long_name: 'chlorophyll-a of a survey', standard_name: 'mass_concentration_of_chlorophyll_a_in_sea_water', units: 'mg m-3' },
      },
    ],
    globalAttributes: { title: 'survey for a test', processing_version: 'S1' },
  }
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
