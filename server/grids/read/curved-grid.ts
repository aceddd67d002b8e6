import type { AxesGrid, CurvilinearGrid } from '../../../shared/science/grid'
import { LayerRefused } from '../layer-refused'
import { edgesFromCentres, isMonotonic, unwrapLongitudes } from './cf-edges'
import { packingOf, unpackInPlace } from './cf-packing'
import { lookUp } from './cf-roles'
import { cornersFromBounds } from './corner-bounds'
import { cornersFromCentres, type Corners, roundDegrees } from './corner-places'
import { maxBoundedCells, maxCurvedCells } from './limits'
import { type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'

export interface CurvedPlace {
  grid: AxesGrid | CurvilinearGrid
  warnings: string[]
}

/** The grid that latitudes and longitudes given cell by cell span: axes where they only say the same over and over. */
export function curvedGrid(file: RawNetcdf, latitude: RawVariable, longitude: RawVariable): CurvedPlace {
  const [rows, columns] = latitude.dimensions.map(({ size }) => size) as [number, number]
  if (rows * columns > maxCurvedCells) {
    throw new LayerRefused('too-large', `${latitude.name} places ${rows} by ${columns} cells one by one; Offing reads up to ${maxCurvedCells / 1e6} million.`, {
      variable: latitude.name, rows, columns, maxCurvedCells,
    })
  }
  const lats = readPlaces(file, latitude)
  const lons = readPlaces(file, longitude)
  const farthest = lats.reduce((most, value) => (Math.abs(value) > most ? Math.abs(value) : most), 0)
  if (farthest > 90 + 1e-6) throw misplaced(latitude, `holds ${farthest}, beyond the poles`)
  if (lons.some((value) => Math.abs(value) > 1080)) throw misplaced(longitude, 'holds angles beyond three turns')
  if (!lats.some((lat, i) => Number.isFinite(lat + lons[i]!))) throw misplaced(latitude, 'and its longitudes have no values')

  const warnings: string[] = []
  const given = boundsOf(file, latitude, longitude, rows, columns, warnings)
  const axes = given ? null : separate(lats, lons, rows, columns)
  if (axes) return { grid: axes, warnings }
  if (!given && (rows < 2 || columns < 2)) {
    throw misplaced(latitude, 'has a single row or column and no bounds, so its cells have no known size')
  }
  const corners = given ?? cornersFromCentres(lats, lons, rows, columns)
  const repeats = repeatedColumns(lats, lons, rows, columns)
  if (repeats > 0) {
    warnings.push(`The last ${repeats === 1 ? 'column repeats' : `${repeats} columns repeat`} the first of ${longitude.name}; they count once.`)
    blankLastColumns(corners, rows, columns, repeats)
  }
  const unplaced = lats.reduce((sum, lat, i) => sum + (Number.isFinite(lat + lons[i]!) ? 0 : 1), 0)
  if (unplaced > 0) warnings.push(`${unplaced} cells have no latitude or longitude; they and their edges are left out.`)
  return {
    grid: { kind: 'curvilinear', rows, columns, cornerLats: roundDegrees(corners.lats), cornerLons: roundDegrees(corners.lons) },
    warnings,
  }
}

function readPlaces(file: RawNetcdf, variable: RawVariable): Float64Array {
  const values = file.read(variable, [0, 0], variable.dimensions.map(({ size }) => size))
  unpackInPlace(values, packingOf(variable))
  return values
}

function boundsOf(
  file: RawNetcdf,
  latitude: RawVariable,
  longitude: RawVariable,
  rows: number,
  columns: number,
  warnings: string[],
): Corners | null {
  if (rows * columns > maxBoundedCells) {
    if (textOf(latitude.attributes, 'bounds') !== null) {
      warnings.push(`The bounds of ${latitude.name} are left unread (more than ${maxBoundedCells / 1e6} million cells); corners are taken half-way between centres.`)
    }
    return null
  }
  const read = (variable: RawVariable): Float64Array | null => {
    const name = textOf(variable.attributes, 'bounds')
    const bounds = name === null ? null : lookUp(file, variable, name)
    const sizes = bounds?.dimensions.map(({ size }) => size)
    if (!bounds?.type || sizes?.length !== 3 || sizes[0] !== rows || sizes[1] !== columns || sizes[2] !== 4) return null
    const values = file.read(bounds, [0, 0, 0], sizes)
    unpackInPlace(values, packingOf({ ...bounds, attributes: new Map([...variable.attributes, ...bounds.attributes]) }))
    return values
  }
  const [lats, lons] = [read(latitude), read(longitude)]
  if (!lats || !lons) return null
  const corners = cornersFromBounds(lats, lons, rows, columns)
  if (!corners) {
    warnings.push(`The bounds of ${latitude.name} leave gaps between cells; corners are taken half-way between centres.`)
  }
  return corners
}

const sameShare = 1e-5

/** Axes, where all rows hold the same longitudes and all columns the same latitudes; null for a truly curved grid. */
function separate(lats: Float64Array, lons: Float64Array, rows: number, columns: number): AxesGrid | null {
  if (rows < 2 || columns < 2) return null
  const axisLats = Float64Array.from({ length: rows }, (_, row) => lats[row * columns]!)
  const axisLons = unwrapLongitudes(lons.slice(0, columns))
  if (!isMonotonic(axisLats) || !isMonotonic(axisLons)) return null
  const slackLat = (sameShare * Math.abs(axisLats[rows - 1]! - axisLats[0]!)) / (rows - 1)
  const slackLon = (sameShare * Math.abs(axisLons[columns - 1]! - axisLons[0]!)) / (columns - 1)
  if (Math.abs(axisLons[columns - 1]! - axisLons[0]!) * (columns / (columns - 1)) > 360 * (1 + 1.5 / columns)) return null
  for (let i = 0; i < lats.length; i++) {
    const [row, column] = [Math.floor(i / columns), i % columns]
    const away = lons[i]! - axisLons[column]!
    const same = Math.abs(lats[i]! - axisLats[row]!) <= slackLat && Math.abs(away - 360 * Math.round(away / 360)) <= slackLon
    if (!same) return null
  }
  const latEdges = edgesFromCentres(axisLats).map((edge) => Math.min(90, Math.max(-90, edge)))
  return { kind: 'axes', rows, columns, latEdges, lonEdges: edgesFromCentres(axisLons) }
}

const mostRepeats = 4

/** How many last columns stand where the first ones stand: models of the whole globe often overlap themselves. */
function repeatedColumns(lats: Float64Array, lons: Float64Array, rows: number, columns: number): number {
  for (let repeats = Math.min(mostRepeats, columns - 2); repeats > 0; repeats--) {
    let [compared, same] = [0, true]
    for (let row = 0; row < rows && same; row++) {
      for (let column = 0; column < repeats && same; column++) {
        const [a, b] = [row * columns + column, row * columns + columns - repeats + column]
        const [lat, lon] = [lats[a]! - lats[b]!, lons[a]! - lons[b]!]
        if (!Number.isFinite(lat + lon)) continue
        compared++
        const next = row * columns + column + 1
        const cell = Math.hypot(lats[next]! - lats[a]!, turned(lons[next]! - lons[a]!))
        same = Math.hypot(lat, turned(lon)) <= 1e-3 * cell
      }
    }
    if (same && compared > 0) return repeats
  }
  return 0
}

const turned = (degrees: number): number => degrees - 360 * Math.round(degrees / 360)

function blankLastColumns({ lats }: Corners, rows: number, columns: number, repeats: number): void {
  for (let row = 0; row <= rows; row++) {
    const end = (row + 1) * (columns + 1)
    lats.fill(NaN, end - repeats, end)
  }
}

function misplaced(variable: RawVariable, reason: string): LayerRefused {
  return new LayerRefused(
    'unknown-place',
    `The file does not say with certainty where its cells are: ${variable.name} ${reason}.`,
    { variable: variable.name, reason },
  )
}
