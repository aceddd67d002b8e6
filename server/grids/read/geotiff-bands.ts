import { gdalItems } from './gdal-metadata'
import { type TiffDirectory, tags } from './tiff-directory'

/** What GDAL's metadata say of one band. */
export interface BandNotes {
  name: string
  longName: string | null
  standardName: string | null
  unit: string | null
  scale: number
  offset: number
  items: Record<string, string>
}

type Items = Record<string, string>

/** GDAL's metadata of the whole file. */
export function datasetItems(directory: TiffDirectory): Items {
  const items = itemsOf(directory, null)
  // Files translated from NetCDF keep the file-wide attributes behind this mark.
  return Object.fromEntries(Object.entries(items).map(([name, text]) => [name.replace(/^NC_GLOBAL#/, ''), text]))
}

export function bandNotes(directory: TiffDirectory, band: number, dataset: Items): BandNotes {
  const items = itemsOf(directory, band)
  const source = items['NETCDF_VARNAME'] ?? null
  const attribute = (name: string) => items[name] ?? (source === null ? undefined : dataset[`${source}#${name}`])
  const name = items['DESCRIPTION'] ?? source
  return {
    name: name ?? `band ${band + 1}`,
    longName: attribute('long_name') ?? null,
    standardName: attribute('standard_name') ?? null,
    unit: items['UNITTYPE'] ?? attribute('units') ?? null,
    scale: Number(items['SCALE'] ?? 1),
    offset: Number(items['OFFSET'] ?? 0),
    items,
  }
}

function itemsOf(directory: TiffDirectory, band: number | null): Items {
  const xml = directory.get(tags.metadata)
  if (typeof xml !== 'string') return {}
  return Object.fromEntries(gdalItems(xml).flatMap(({ name, sample, text }) => (sample === band ? [[name, text]] : [])))
}
