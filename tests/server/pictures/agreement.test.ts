import { join } from 'node:path'
import sharp from 'sharp'
import { describe, expect, it } from 'vitest'
import { encodeGrid } from '../../../server/grids/grid-text'
import { openGridSource } from '../../../server/grids/read/open'
import { projectTo } from '../../../server/grids/read/project'
import { cellFinder } from '../../../server/pictures/cell-finder'
import { latitudeOf, longitudeOf } from '../../../server/pictures/mercator'
import { drawTile } from '../../../server/workers/draw-tile'
import { readCells } from '../../../server/workers/read-cells'
import { surveyLayer } from '../../../server/workers/survey-layer'
import { shadesOf, shareOf, type Colouring, type ColouredFeed } from '../../../shared/colouring'

const folder = join(import.meta.dirname, '../../reference/grids')
const range = { validMin: null, validMax: null }

/** Files with grids of every kind, made by Debian's netCDF4 and GDAL (tests/reference/make). */
const files = ['nc4-curvilinear-dateline.nc', 'nc4-curvilinear.nc', 'tiff-laea-europe.tif', 'tiff-utm32-rotated.tif', 'tiff-polar-stereographic.tif', 'nc4-21-to-379.nc', 'nc4-lon-descending.nc', 'classic-past-180-as-360.nc', 'tiff-south-up.tif']

async function layerOf(name: string) {
  const path = join(folder, name)
  const source = await openGridSource(path, name)
  const variable = source.variables.find((one) => one.quantity !== 'other') ?? source.variables[0]!
  source.close()
  const { grid } = variable
  const layer = {
    path, fileName: name, variable: variable.name, step: 0, processingVersion: '1', observedAt: 0, endsAt: null, producedAt: null, rows: grid.rows, columns: grid.columns,
    pack: null, reading: { hiddenFlags: [], storedLog10: false, fileUnit: null, unit: variable.unit },
  }
  const feed: ColouredFeed = { quantity: 'other', variable: variable.name, unit: variable.unit, scale: 'linear', ...range }
  return { layer, grid, feed }
}

describe('picture, point and legend', () => {
  it.each(files)('agree on every cell of %s', async (name) => {
    const { layer, grid, feed } = await layerOf(name)
    const survey = await surveyLayer({ layer, feed, rows: grid.rows, columns: grid.columns })
    const everyCell = Array.from({ length: grid.rows * grid.columns }, (_, i) => ({ layer, row: Math.floor(i / grid.columns), column: i % grid.columns }))
    const values = await readCells({ cells: everyCell, range })
    expect(values.filter((value) => value !== null)).toHaveLength(survey.valid)
    expect(survey.bins.reduce((sum, count) => sum + count, survey.below + survey.above)).toBe(survey.valid)

    const find = cellFinder(grid, grid.kind === 'transform' ? projectTo(grid.crs) : undefined)
    let drawn = 0
    for (const [z, x, y] of tilesWithCells(find)) {
      const pixels = await pixelsOf(await drawTile({ layer, range, colouring: survey.colouring, grid: encodeGrid(grid), z, x, y, theme: 'light' }))
      for (let py = 3; py < 256; py += 11) {
        for (let px = 5; px < 256; px += 13) {
          const cell = find(longitudeOf(z, x * 256 + px + 0.5), latitudeOf(z, y * 256 + py + 0.5))
          const value = cell ? values[cell.row * grid.columns + cell.column]! : null
          expect(pixels?.(px, py) ?? null).toEqual(value === null ? null : shade(survey.colouring, value))
          if (value !== null) drawn++
        }
      }
    }
    expect(drawn).toBeGreaterThan(20)
  })
})

function shade(colouring: Colouring, value: number): number[] {
  const at = Math.round(shareOf(colouring, value) * 511) * 3
  return [...shadesOf(colouring, 'light', 512).subarray(at, at + 3)]
}

async function pixelsOf(tile: Uint8Array | null): Promise<((px: number, py: number) => number[] | null) | null> {
  if (!tile) return null
  const data = await sharp(tile).raw().toBuffer()
  return (px, py) => (data[(py * 256 + px) * 4 + 3] === 0 ? null : [...data.subarray((py * 256 + px) * 4, (py * 256 + px) * 4 + 3)])
}

/** The tile of the whole globe, and of finer ones a few that hold cells. */
function tilesWithCells(find: ReturnType<typeof cellFinder>): [number, number, number][] {
  const tiles = new Map<string, [number, number, number]>([['0', [0, 0, 0]]])
  for (const z of [2, 5]) {
    const across = 2 ** z
    for (let y = 0; y < across; y++) {
      for (let x = 0; x < across; x++) {
        const holds = [40, 128, 216].some((py) => [40, 128, 216].some((px) => find(longitudeOf(z, x * 256 + px), latitudeOf(z, y * 256 + py)) !== null))
        if (holds && tiles.size < 1 + z * 2) tiles.set(`${z}/${x}/${y}`, [z, x, y])
      }
    }
  }
  return [...tiles.values()]
}
