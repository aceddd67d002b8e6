import proj4 from 'proj4'

type Convert = (a: number, b: number) => [number, number]

interface Projector {
  project: Convert
  unproject: Convert
}

const projectors = new Map<string, Projector>()
const mostKept = 64

/**
 * From longitude and latitude (degrees, WGS84) to the plane of a `TransformGrid.crs`. Where the projection has no
 * answer both numbers are NaN: such a point has no place on the raster. Throws on a definition proj4 doesn't know.
 */
export function projectTo(crs: string): (longitude: number, latitude: number) => [x: number, y: number] {
  return projectorOf(crs).project
}

/** From the plane of a crs to longitude and latitude in degrees; NaN where the projection has no answer. */
export function unprojectFrom(crs: string): (x: number, y: number) => [longitude: number, latitude: number] {
  return projectorOf(crs).unproject
}

function projectorOf(crs: string): Projector {
  const known = projectors.get(crs)
  if (known) return known
  const converter = proj4(crs)
  const projector = {
    project: answering((longitude, latitude) => converter.forward([longitude, latitude])),
    unproject: answering((x, y) => converter.inverse([x, y])),
  }
  if (projectors.size >= mostKept) projectors.clear()
  projectors.set(crs, projector)
  return projector
}

function answering(convert: (a: number, b: number) => number[]): Convert {
  return (a, b) => {
    try {
      const [first = NaN, second = NaN] = convert(a, b)
      return Number.isFinite(first) && Number.isFinite(second) ? [first, second] : [NaN, NaN]
    } catch {
      // proj4 throws outside a projection's domain; a point without a place is an answer, not an error.
      return [NaN, NaN]
    }
  }
}
