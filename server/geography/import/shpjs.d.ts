/** What is used of shpjs, which brings no types of its own for its parts. */
declare module 'shpjs' {
  import type { Geometry } from 'geojson'
  /** Shapes in order; null for one without a geometry. Hangs or throws on damaged record headers: check them first. */
  export function parseShp(shp: Uint8Array): (Geometry | null)[]
  /** Rows in order. Believes the number of records in its header: check it first. */
  export function parseDbf(dbf: Uint8Array, encoding?: Uint8Array): Record<string, unknown>[]
}
