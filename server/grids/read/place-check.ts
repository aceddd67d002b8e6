import type { CurvilinearGrid, TransformGrid } from '../../../shared/science/grid'
import { cellCentre } from '../cell-centre'
import { LayerRefused } from '../layer-refused'
import { packingOf, unpackInPlace } from './cf-packing'
import { projectTo } from './project'
import type { RawNetcdf, RawVariable } from './raw-netcdf'

const samples = 7

/**
 * Cells of a projected grid must have places on Earth, and where the file also gives latitude and longitude cell by
 * cell, the two must agree within a cell: of two contradicting statements neither can be trusted.
 */
export function checkPlaces(
  grid: TransformGrid | CurvilinearGrid,
  name: string,
  file?: RawNetcdf,
  latitude?: RawVariable,
  longitude?: RawVariable,
): void {
  let [placed, compared, apart] = [0, 0, 0]
  for (const row of spread(grid.rows)) {
    for (const column of spread(grid.columns)) {
      const centre = cellCentre(grid, row * grid.columns + column)
      if (!Number.isFinite(centre[0] + centre[1])) continue
      placed++
      if (!file || !latitude || !longitude) continue
      const [lat, lon] = [latitude, longitude].map((variable) => valueAt(file, variable, row, column)) as [number, number]
      if (!Number.isFinite(lat + lon)) continue
      compared++
      if (cellsApart(grid, row, column, centre, [lon, lat]) > 1) apart++
    }
  }
  if (placed === 0) throw refused(name, 'its map projection cannot be turned into places')
  if (apart * 2 > compared) {
    throw refused(name, 'its map projection and its latitudes and longitudes contradict each other')
  }
}

function spread(count: number): number[] {
  return [...new Set(Array.from({ length: samples }, (_, i) => Math.floor(((count - 1) * i) / (samples - 1))))]
}

function valueAt(file: RawNetcdf, variable: RawVariable, row: number, column: number): number {
  const value = file.read(variable, [row, column], [1, 1])
  unpackInPlace(value, packingOf(variable))
  return value[0]!
}

function cellsApart(
  grid: TransformGrid | CurvilinearGrid,
  row: number,
  column: number,
  [lon, lat]: readonly [number, number],
  [otherLon, otherLat]: readonly [number, number],
): number {
  if (grid.kind === 'transform') {
    const [t, project] = [grid.transform, projectTo(grid.crs)]
    const [x, y] = project(otherLon, otherLat)
    const [dx, dy] = [x - (t[0] + t[1] * (column + 0.5) + t[2] * (row + 0.5)), y - (t[3] + t[4] * (column + 0.5) + t[5] * (row + 0.5))]
    return Math.hypot(dx, dy) / Math.min(Math.hypot(t[1], t[4]), Math.hypot(t[2], t[5]))
  }
  const beside = cellCentre(grid, row * grid.columns + (column > 0 ? column - 1 : column + 1))
  const apart = (a: readonly [number, number], b: readonly [number, number]) => {
    const aside = (a[0] - b[0] - 360 * Math.round((a[0] - b[0]) / 360)) * Math.cos((a[1] * Math.PI) / 180)
    return Math.hypot(aside, a[1] - b[1])
  }
  return apart([lon, lat], [otherLon, otherLat]) / apart([lon, lat], beside)
}

function refused(name: string, reason: string): LayerRefused {
  return new LayerRefused('unknown-place', `The file does not say with certainty where the cells of ${name} are: ${reason}.`, {
    variable: name,
    reason,
  })
}
