import { rename } from 'node:fs/promises'
import { join } from 'node:path'
import { writeGeotiff } from '../../grids/write/geotiff'
import type { GridFile, GridFileVariable } from '../../grids/write/grid-file'
import { writeNetcdfClassic } from '../../grids/write/netcdf-classic'
import { writeNetcdf4 } from '../../grids/write/netcdf4'
import { chlorophyllOn, gridOf, reflectanceOn } from './fields'
import type { DemoFile } from './files'
import { box } from './grid'
import { cooperative, feeds, reflectanceBands } from './scenario'
import type { ChlorophyllFeedKey } from './scenario'

const chlorophyllName = 'mass_concentration_of_chlorophyll_a_in_sea_water'
const reflectanceName =
  'surface_ratio_of_upwelling_radiance_emerging_from_sea_water_to_downwelling_radiative_flux_in_air'

/**
 * Writes a planned file into a directory and answers its path. It grows under a hidden name and is renamed when whole,
 * so that nobody who watches the directory takes half of it.
 */
export async function writeDemoFile(file: DemoFile, directory: string): Promise<string> {
  const path = join(directory, file.name)
  const growing = join(directory, `.${file.name}.part`)
  if (file.format === 'geotiff') await writeImage(growing, file)
  else if (file.format === 'netcdf4') await writeNetcdf4(growing, { ...gridFile(file), deflate: 1 })
  else await writeNetcdfClassic(growing, gridFile(file))
  await rename(growing, path)
  return path
}

function gridFile(file: DemoFile): GridFile {
  const { latitudes, longitudes } = gridOf(file.content === 'rrs' ? 'chl' : file.content)
  const steps = file.content === 'rrs' ? reflectanceSteps(file) : chlorophyllSteps(file, file.content)
  return { latitudes, longitudes, ...steps, globalAttributes: globalAttributes(file) }
}

function globalAttributes({ content, processingVersion }: DemoFile) {
  const what = content === 'rrs' ? 'remote-sensing reflectance' : 'chlorophyll'
  return {
    title: `DEMO synthetic data: daily ${what}`,
    institution: cooperative,
    source: 'invented by the demo scenario; no satellite saw this sea',
    processing_level: 'L3 mapped',
    processing_version: processingVersion,
  }
}

function chlorophyllSteps(file: DemoFile, feed: ChlorophyllFeedKey): Pick<GridFile, 'times' | 'variables'> {
  const { latitudes, longitudes } = gridOf(feed)
  const cells = latitudes.length * longitudes.length
  const data = new Float64Array(file.days.length * cells)
  const times = file.days.map((day, step) => {
    const field = chlorophyllOn(feed, day)
    if (!field) throw new RangeError(`${file.name}: ${feed} has no layer on day ${day}`)
    data.set(field.values, step * cells)
    return field.observedAt
  })
  const attributes = { long_name: 'chlorophyll-a (DEMO)', standard_name: chlorophyllName, units: 'mg m-3' }
  const packing = file.packing === 'int16' ? ({ dtype: 'i2', scale: 0.002, offset: 0 } as const) : ({ dtype: 'f4' } as const)
  return { times, variables: [{ name: variableOf(feed), data, attributes, ...packing }] }
}

function reflectanceSteps(file: DemoFile): Pick<GridFile, 'times' | 'variables'> {
  const { latitudes, longitudes } = gridOf('chl')
  const cells = latitudes.length * longitudes.length
  const variables: GridFileVariable[] = reflectanceBands.map((band) => ({
    name: `Rrs_${band}`,
    dtype: 'i2',
    scale: 2e-6,
    offset: 0.05,
    data: new Float64Array(file.days.length * cells),
    attributes: {
      long_name: `remote-sensing reflectance at ${band} nm (DEMO)`,
      standard_name: reflectanceName,
      units: 'sr-1',
      wavelength: band,
    },
  }))
  const times = file.days.map((day, step) => {
    const field = reflectanceOn(day)
    if (!field) throw new RangeError(`${file.name}: no reflectance on day ${day}`)
    reflectanceBands.forEach((band, i) => variables[i]?.data.set(field.values[band], step * cells))
    return field.observedAt
  })
  return { times, variables }
}

/** A picture of one day. It holds no time: the date is in its name only, as many providers have it. */
async function writeImage(path: string, file: DemoFile): Promise<void> {
  const [day = Number.NaN] = file.days
  const field = file.content === 'rrs' ? null : chlorophyllOn(file.content, day)
  if (!field) throw new RangeError(`${file.name}: an image needs one day of chlorophyll`)
  const { latitudes, longitudes } = gridOf('chl')
  const [rows, columns] = [latitudes.length, longitudes.length]
  const { title, source, processing_version } = globalAttributes(file)
  await writeGeotiff(path, {
    rows, columns, west: box.west, north: box.north,
    lonStep: (box.east - box.west) / columns, latStep: (box.north - box.south) / rows,
    values: field.values, noData: -9999, deflate: true,
    description: variableOf('chl'), unit: 'mg m-3',
    metadata: { title, source, processing_version },
  })
}

function variableOf(feed: ChlorophyllFeedKey): string {
  const found = feeds.find(({ key }) => key === feed)
  if (!found) throw new Error(`The demo has no feed ${feed}.`)
  return found.variable
}
