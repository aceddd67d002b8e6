import type { Context } from '../context'
import type { Transaction } from '../db'

export interface ActiveGeometry {
  id: number
  regionId: number
  west: number
  south: number
  east: number
  north: number
  centreLongitude: number
}

/** The outlines now in force of regions that are not retired. */
export async function activeGeometries(context: Context, tx?: Transaction): Promise<ActiveGeometry[]> {
  return context.db.all<ActiveGeometry>(
    `SELECT g.id, g.region_id AS regionId, g.west, g.south, g.east, g.north, g.centre_longitude AS centreLongitude
     FROM geometries g JOIN regions r ON r.geometry_id = g.id WHERE r.retired_at IS NULL ORDER BY g.id`,
    {},
    tx,
  )
}
