import { readdirSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { inspectGrid, type InspectReport } from '../../server/grids/inspect'
import { LayerRefused } from '../../server/grids/layer-refused'

/**
 * FILES.md is the list of every kind of file tried, with its outcome. It is written from the files themselves
 * (`npx vitest run --project core tests/reference/files.test.ts -u`), so that it says what is true.
 */
const folder = new URL('.', import.meta.url).pathname
const opening = `# Files tried

Every file here is made by a script in \`make\` with Debian's netCDF4, h5py, PyTables, zstd or GDAL (rasterio). What is read is compared
cell by cell, and in its figures over regions, with what those tools, numpy and shapely find (\`grids.test.ts\`). What is refused was looked at
as it stands. This list is written by \`files.test.ts\` from the files themselves.
`

const closing = `
## Tried without a file of their own

| kind | outcome |
|---|---|
| Debian's ocean grids (ferret-datasets), classic NetCDF | read, compared with xarray |
| hurt files: flipped bits, changed bytes, cuts; 500 a format in CI | right or refused where a checksum is carried, never a hang or a crash |
| any grid of 2 to 40 rows and columns in NetCDF-4 and classic, any raster of 1 to 40 in GeoTIFF | reads back as written |
| a field of 8640 x 4320 | read within 600 MB, windows without reading the field |
| classic: huge declared sizes, lying record counts, thousands or billions of variables, names longer than the file | truncated, too-large or damaged |
| axes: NaN, infinite, past the poles, turning back, of another length, of no size; a single row or column | unknown-place or no-grid |
| a time axis of no size | no-time |
| TIFF: directories in circles or beyond the end, strips beyond the end, thousands of bands, unknown packing, a strip that unpacks to far more | damaged, truncated, too-large or unsupported-encoding |
| gzip: cut, changed, packed twice, lying about its size, expanding without end | truncated, damaged, unsupported-encoding or too-large |
| text, a web page, PNG, JPEG, an empty file | unknown-format or empty-file, named for what it is |
| markup in names, titles and attributes | read; it is text and stays text |

## Refused though somebody may wish for it

| kind | why |
|---|---|
| HDF4 (and so HDF-EOS2), GRIB, Zarr, JPEG 2000, NetCDF in zip or tar | another format altogether; convert to NetCDF-4 |
| HDF5 whose data lie in other files: external storage, external links, virtual datasets | a file that is sent must hold its data |
| HDF5 filters LZO, Blosc with zlib or Snappy, n-bit narrower than its number | no decoder, or none that is certain |
| TIFF in JPEG, WebP, LERC or LZMA; palettes; bands of different number types | lossy, or not decoded |
| a grid of one row or one column without bounds | nobody says how large its cells are |
| climatologies as observations | several years folded into one are no day |
| a unit or a place that cannot be told with certainty | a wrong number is worse than none |

## Not tried

HDF5 filters Blosc2, BitGroom and BitRound: their decoders are loaded, but no Debian package writes a file to try them on.
`

async function outcomeOf(path: string, name: string): Promise<InspectReport | LayerRefused> {
  try {
    return await inspectGrid(path, name)
  } catch (error) {
    if (error instanceof LayerRefused) return error
    throw error
  }
}

function readLine(name: string, { format, variables }: InspectReport): string {
  const [first] = variables
  const { kind, rows, columns } = first!.grid
  const steps = first!.times.count
  return `| ${name} | ${format} | ${variables.length === 1 ? first!.name : `${variables.length} variables`} | ${kind}, ${rows} x ${columns} | ${steps} | read |`
}

async function linesOf(place: string): Promise<{ read: string[]; refused: string[] }> {
  const lines = { read: [] as string[], refused: [] as string[] }
  for (const name of readdirSync(folder + place).sort()) {
    if (name.endsWith('.json')) continue
    const outcome = await outcomeOf(`${folder}${place}/${name}`, name)
    if (outcome instanceof LayerRefused) lines.refused.push(`| ${name} | ${outcome.code} | ${outcome.message} |`)
    else lines.read.push(readLine(name, outcome))
  }
  return lines
}

describe('the list of files tried', () => {
  it('says what comes of each', async () => {
    const [grids, hostile] = [await linesOf('grids'), await linesOf('refused')]
    // What numpy and shapely have figures for is read, all of it.
    expect(grids.refused).toEqual([])
    expect(grids.read.length).toBeGreaterThanOrEqual(114)
    const read = ['', `## Read (${grids.read.length + hostile.read.length})`, '', '| file | format | variable | grid | steps | outcome |', '|---|---|---|---|---|---|', ...grids.read, ...hostile.read]
    const refused = ['', `## Refused (${hostile.refused.length})`, '', '| file | code | sentence |', '|---|---|---|', ...hostile.refused]
    await expect([opening.trimEnd(), ...read, ...refused, closing.trimEnd(), ''].join('\n')).toMatchFileSnapshot('./FILES.md')
  })
})
