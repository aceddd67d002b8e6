import proj4 from 'proj4'

export interface Projector {
  /** Degrees (WGS84) to the plane; null where the projection has no answer. */
  forward(longitude: number, latitude: number): [number, number] | null
  /** The plane to degrees (WGS84); null where the projection has no answer. */
  inverse(x: number, y: number): [number, number] | null
}

const projectors = new Map<string, Projector>()
const maxProjectors = 64

/** Both ways between longitude/latitude and the plane of a `TransformGrid.crs`. Throws on an unknown definition. */
export function projectTo(crs: string): Projector {
  const known = projectors.get(crs)
  if (known) return known
  const converter = proj4(crs)
  const attempt = (work: () => number[]): [number, number] | null => {
    try {
      const [a, b] = work()
      return a !== undefined && b !== undefined && Number.isFinite(a) && Number.isFinite(b) ? [a, b] : null
    } catch {
      // proj4 throws on points outside a projection's domain; such a point has no place, which is an answer.
      return null
    }
  }
  const projector: Projector = {
    forward: (longitude, latitude) => attempt(() => converter.forward([longitude, latitude])),
    inverse: (x, y) => attempt(() => converter.inverse([x, y])),
  }
  if (projectors.size >= maxProjectors) projectors.clear()
  projectors.set(crs, projector)
  return projector
}

/** From the plane of a crs to degrees. */
export function unprojectFrom(crs: string): Projector['inverse'] {
  return projectTo(crs).inverse
}
