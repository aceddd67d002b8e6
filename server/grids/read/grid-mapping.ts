import { numbersOf, type RawVariable, textOf } from './raw-netcdf'

/** A projection by a NetCDF file's grid mapping. */
export type Mapping =
  | { kind: 'degrees' }
  /** `perUnit`: what one unit of the file's coordinates is in the plane of `crs`. */
  | { kind: 'proj4'; crs: string; angular: number | null }
  | { kind: 'rotated'; poleLat: number; poleLon: number; poleGridLon: number }

/**
 * The projection that a grid mapping variable names, by CF's appendix F, else by its crs_wkt; null when it is none this
 * knows. `angular` is the height that turns scan angles in radians into the plane's metres (geostationary only).
 */
export function mappingOf(variable: RawVariable): Mapping | null {
  const name = textOf(variable.attributes, 'grid_mapping_name')?.toLowerCase() ?? null
  const number = (attribute: string) => numbersOf(variable.attributes, attribute)[0]
  if (name === 'latitude_longitude') return { kind: 'degrees' }
  if (name === 'rotated_latitude_longitude') {
    const [poleLat, poleLon] = [number('grid_north_pole_latitude'), number('grid_north_pole_longitude')]
    if (poleLat === undefined || poleLon === undefined) return null
    return { kind: 'rotated', poleLat, poleLon, poleGridLon: number('north_pole_grid_longitude') ?? 0 }
  }
  const parts = name === null ? null : (projections[name]?.(reader(variable)) ?? null)
  if (parts !== null) {
    const crs = ['+proj=' + parts, ellipsoidOf(variable), '+units=m', '+no_defs'].join(' ')
    return { kind: 'proj4', crs, angular: name === 'geostationary' ? number('perspective_point_height')! : null }
  }
  const wkt = textOf(variable.attributes, 'crs_wkt') ?? textOf(variable.attributes, 'spatial_ref')
  return wkt !== null && isInMetres(wkt) ? { kind: 'proj4', crs: wkt, angular: null } : null
}

type Read = ReturnType<typeof reader>

function reader(variable: RawVariable) {
  return {
    number: (name: string) => numbersOf(variable.attributes, name)[0],
    numbers: (name: string) => numbersOf(variable.attributes, name),
    text: (name: string) => textOf(variable.attributes, name),
  }
}

const shifts = ({ number }: Read) => `+x_0=${number('false_easting') ?? 0} +y_0=${number('false_northing') ?? 0}`
const origin = (read: Read) => `+lat_0=${read.number('latitude_of_projection_origin') ?? 0} +lon_0=${read.number('longitude_of_projection_origin') ?? 0}`
const meridian = ({ number }: Read) => `+lon_0=${number('longitude_of_central_meridian') ?? number('longitude_of_projection_origin') ?? 0}`

/** Each answers the rest of a proj4 definition, or null when the file leaves out what can't be left out. */
const projections: Record<string, (read: Read) => string | null> = {
  albers_conical_equal_area: (read) => conic('aea', read),
  lambert_conformal_conic: (read) => conic('lcc', read),
  azimuthal_equidistant: (read) => `aeqd ${origin(read)} ${shifts(read)}`,
  lambert_azimuthal_equal_area: (read) => `laea ${origin(read)} ${shifts(read)}`,
  orthographic: (read) => `ortho ${origin(read)} ${shifts(read)}`,
  lambert_cylindrical_equal_area: (read) => {
    const parallel = read.number('standard_parallel')
    return parallel === undefined ? null : `cea +lat_ts=${parallel} ${meridian(read)} ${shifts(read)}`
  },
  mercator: (read) => {
    const parallel = read.number('standard_parallel')
    const scale = read.number('scale_factor_at_projection_origin')
    return `merc ${parallel === undefined ? `+k_0=${scale ?? 1}` : `+lat_ts=${parallel}`} ${meridian(read)} ${shifts(read)}`
  },
  sinusoidal: (read) => `sinu ${meridian(read)} ${shifts(read)}`,
  stereographic: (read) => `stere ${origin(read)} +k_0=${read.number('scale_factor_at_projection_origin') ?? 1} ${shifts(read)}`,
  polar_stereographic: (read) => {
    const parallel = read.number('standard_parallel')
    const scale = read.number('scale_factor_at_projection_origin')
    const lon = read.number('straight_vertical_longitude_from_pole') ?? read.number('longitude_of_projection_origin')
    const pole = read.number('latitude_of_projection_origin') ?? (parallel === undefined ? undefined : 90 * Math.sign(parallel))
    if (lon === undefined || pole === undefined || (parallel === undefined && scale === undefined)) return null
    const truth = parallel === undefined ? `+k_0=${scale}` : `+lat_ts=${parallel}`
    return `stere +lat_0=${pole} ${truth} +lon_0=${lon} ${shifts(read)}`
  },
  transverse_mercator: (read) => {
    const scale = read.number('scale_factor_at_central_meridian')
    const lat = read.number('latitude_of_projection_origin')
    return scale === undefined || lat === undefined ? null : `tmerc +lat_0=${lat} +k=${scale} ${meridian(read)} ${shifts(read)}`
  },
  geostationary: (read) => {
    const height = read.number('perspective_point_height')
    const fixed = read.text('fixed_angle_axis')
    const sweep = read.text('sweep_angle_axis') ?? (fixed === null ? null : fixed === 'x' ? 'y' : 'x')
    return height === undefined || sweep === null
      ? null
      : `geos +h=${height} +lon_0=${read.number('longitude_of_projection_origin') ?? 0} +sweep=${sweep} ${shifts(read)}`
  },
}

function conic(name: string, read: Read): string | null {
  const [first, second] = read.numbers('standard_parallel')
  if (first === undefined) return null
  const lat = read.number('latitude_of_projection_origin') ?? first
  return `${name} +lat_1=${first} +lat_2=${second ?? first} +lat_0=${lat} ${meridian(read)} ${shifts(read)}`
}

function ellipsoidOf(variable: RawVariable): string {
  const { number } = reader(variable)
  const radius = number('earth_radius')
  if (radius !== undefined) return `+a=${radius} +b=${radius}`
  const [a, b, inverse] = [number('semi_major_axis'), number('semi_minor_axis'), number('inverse_flattening')]
  if (a === undefined) return '+datum=WGS84'
  const isWgs84 = Math.abs(a - 6378137) < 0.01 && (inverse === undefined ? b !== undefined && Math.abs(b - 6356752.314) < 0.01 : Math.abs(inverse - 298.257223563) < 1e-4)
  if (isWgs84) return '+datum=WGS84'
  if (b !== undefined) return `+a=${a} +b=${b}`
  return inverse === undefined || inverse === 0 ? `+a=${a} +b=${a}` : `+a=${a} +rf=${inverse}`
}

/** Only a definition that says so itself is taken to count metres. */
function isInMetres(wkt: string): boolean {
  if (!/^\s*(PROJCS|PROJCRS|PROJECTEDCRS)\b/i.test(wkt)) return false
  const lengths = [...wkt.matchAll(/(?:LENGTH)?UNIT\s*\[\s*"(met(?:re|er)s?|m)"\s*,\s*1(?:\.0*)?\s*[,\]]/gi)]
  return lengths.length > 0 && !/UNIT\s*\[\s*"[^"]*(foot|feet|kilomet)/i.test(wkt)
}
