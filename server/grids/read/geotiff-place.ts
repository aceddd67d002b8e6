import { toProj4 } from 'geotiff-geokeys-to-proj4'
import type { Grid, TransformGrid } from '../../../shared/science/grid'
import { LayerRefused } from '../layer-refused'
import { type GeoKeys, geoKeysOf } from './geotiff-keys'
import { projectTo, unprojectFrom } from './project'
import { numberIn, numbersIn, type TiffDirectory, tags } from './tiff-directory'

type Transform = TransformGrid['transform']

/** Where the cells of a GeoTIFF are: axes for north-up degrees, else the transform and its projection. */
export function geotiffGrid(directory: TiffDirectory, fileName: string): Grid {
  const [rows, columns] = [numberIn(directory, tags.height, 0), numberIn(directory, tags.width, 0)]
  const affine = transformOf(directory)
  const keys = readKeys(directory, fileName)
  if (!affine || !keys) {
    throw unknownPlace(
      affine
        ? 'This TIFF file has no coordinate system, so nobody can tell where its cells are.'
        : 'This TIFF file carries no georeference: it is a picture without a place on the map.',
      fileName,
    )
  }
  // With pixel-is-point the tie point is the centre of its cell, with pixel-is-area (the default) its corner.
  const area = keys['GTRasterTypeGeoKey'] === 2 ? shift(affine, -0.5) : affine
  // The converter reads the keys it knows and ignores the rest; its type names them all as present.
  const crs = toProj4(keys as unknown as Parameters<typeof toProj4>[0])
  const problems = Object.keys(crs.errors ?? {}).filter((problem) => !problem.startsWith('vertical'))
  if (!crs.proj4 || problems.length > 0) {
    throw unknownPlace('The coordinate system of this TIFF file is not one Offing knows.', fileName, { problems })
  }
  const { x, y } = crs.coordinatesConversionParameters
  const transform: Transform = [
    area[0] * x, area[1] * x, area[2] * x, area[3] * y, area[4] * y, area[5] * y,
  ]
  if (transform.some((number) => !Number.isFinite(number)) || transform[1] * transform[5] === transform[2] * transform[4]) {
    throw unknownPlace('The georeference of this TIFF file is impossible.', fileName, { transform })
  }
  if (crs.isGCS && transform[2] === 0 && transform[4] === 0) return degreeGrid(transform, rows, columns, fileName)
  if (!crs.isGCS && crs.coordinatesUnits !== 'metre') {
    throw unknownPlace('The coordinate system of this TIFF file does not count in lengths.', fileName, {
      unit: crs.coordinatesUnits,
    })
  }
  const grid: TransformGrid = { kind: 'transform', rows, columns, transform, crs: crs.proj4.trim() }
  checkProjection(grid, fileName)
  return grid
}

function readKeys(directory: TiffDirectory, fileName: string): GeoKeys | null {
  try {
    return geoKeysOf(directory)
  } catch (error) {
    throw unknownPlace('The coordinate system of this TIFF file is damaged.', fileName, { reason: String(error) })
  }
}

function transformOf(directory: TiffDirectory): Transform | null {
  const matrix = numbersIn(directory, tags.transformation)
  if (matrix.length >= 8) return [matrix[3]!, matrix[0]!, matrix[1]!, matrix[7]!, matrix[4]!, matrix[5]!]
  const scale = numbersIn(directory, tags.pixelScale)
  const tie = numbersIn(directory, tags.tiepoint)
  // Several tie points are control points of a warp, not an affine placement.
  if (scale.length < 2 || tie.length !== 6) return null
  const [column, row, , x, y] = tie as [number, number, number, number, number, number]
  return [x - column * scale[0]!, scale[0]!, 0, y + row * scale[1]!, 0, -scale[1]!]
}

function shift([a, b, c, d, e, f]: Transform, cells: number): Transform {
  return [a + cells * (b + c), b, c, d + cells * (e + f), e, f]
}

function degreeGrid([x, dx, , y, , dy]: Transform, rows: number, columns: number, fileName: string): Grid {
  const latEdges = Float64Array.from({ length: rows + 1 }, (_, row) => y + row * dy)
  const lonEdges = Float64Array.from({ length: columns + 1 }, (_, column) => x + column * dx)
  const beyond = Math.max(Math.abs(latEdges[0]!), Math.abs(latEdges[rows]!)) - 90
  // Half a cell past the pole is common (centres on the pole) and is cut; more than that is no place on Earth.
  if (beyond > Math.abs(dy) * 0.51 || Math.abs(columns * dx) > 360 + Math.abs(dx) * 1.5 || Math.abs(x) > 1080) {
    throw unknownPlace('The georeference of this TIFF file leaves the globe.', fileName, { x, dx, y, dy })
  }
  const cut = latEdges.map((edge) => Math.min(90, Math.max(-90, edge)))
  return { kind: 'axes', rows, columns, latEdges: cut, lonEdges }
}

/** The projection must be one that can be undone at the raster's corners, else its cells have no place or area. */
function checkProjection({ transform: t, rows, columns, crs }: TransformGrid, fileName: string): void {
  const [project, unproject] = [projectTo(crs), unprojectFrom(crs)]
  const cell = Math.hypot(t[1], t[4])
  const corners = [[0, 0], [columns, 0], [0, rows], [columns, rows], [columns / 2, rows / 2]] as const
  const known = corners.some(([column, row]) => {
    const x = t[0] + t[1] * column + t[2] * row
    const y = t[3] + t[4] * column + t[5] * row
    const back = project(...unproject(x, y))
    return Math.hypot(back[0] - x, back[1] - y) < cell * 0.01
  })
  if (!known) throw unknownPlace('The map projection of this TIFF file cannot be turned into places.', fileName, { crs })
}

function unknownPlace(message: string, fileName: string, facts: Record<string, unknown> = {}): LayerRefused {
  return new LayerRefused('unknown-place', message, { fileName, ...facts })
}
