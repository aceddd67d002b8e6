import type { GeoTIFFImage } from 'geotiff'

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

export async function datasetItems(image: GeoTIFFImage): Promise<Items> {
  const items = clean(await image.getGDALMetadata(null))
  // Files translated from NetCDF keep the file-wide attributes behind this mark.
  return Object.fromEntries(Object.entries(items).map(([name, text]) => [name.replace(/^NC_GLOBAL#/, ''), text]))
}

export async function bandNotes(image: GeoTIFFImage, band: number, dataset: Items): Promise<BandNotes> {
  const items = clean(await image.getGDALMetadata(band))
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

function clean(metadata: Record<string, unknown> | null): Items {
  const items: Items = {}
  for (const [name, value] of Object.entries(metadata ?? {})) {
    if (typeof value === 'string') items[unescape(name)] = unescape(value)
  }
  return items
}

function unescape(text: string): string {
  return text
    .replaceAll('&lt;', '<')
    .replaceAll('&gt;', '>')
    .replaceAll('&quot;', '"')
    .replaceAll('&apos;', "'")
    .replaceAll('&amp;', '&')
}
