import type { RegionVersion } from '../../shared/schemas/outlines'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { GeometryRecord } from '../models/geometry'

/** Every version of a region's outline, newest first, with who drew it and how much rests on it. */
export async function outlineVersions(context: Context, regionId: number): Promise<RegionVersion[]> {
  const region = await context.models.regions.findByPk(regionId)
  if (!region) throw new ApiError('not-found', 'There is no such region.')
  const geometries = await context.models.geometries.findAll({ where: { regionId }, order: [['version', 'DESC']] })
  const people = await context.models.users.findAll({ attributes: ['id', 'name'], where: { id: geometries.flatMap(({ createdBy }) => createdBy ?? []) } })
  const names = new Map(people.map((person) => [person.id, person.name]))
  const counts = await context.db.all<{ geometryId: number; views: number }>(
    `SELECT g.id AS geometryId, (SELECT count(*) FROM summaries s WHERE s.geometry_id = g.id) AS views FROM geometries g WHERE g.region_id = $regionId`,
    { regionId },
  )
  const views = new Map(counts.map((count) => [count.geometryId, count.views]))
  return geometries.map((geometry) => ({
    version: geometry.version,
    geometry: geometry.geometry,
    areaKm2: geometry.areaKm2,
    shoreBufferKm: geometry.shoreBufferKm,
    repairs: geometry.repairs,
    createdAt: new Date(geometry.createdAt).toISOString(),
    createdBy: geometry.createdBy === null ? null : (names.get(geometry.createdBy) ?? null),
    inForce: geometry.id === region.geometryId,
    views: views.get(geometry.id) ?? 0,
  }))
}

/** One version of an outline with the name of its region; the one in force unless another is asked for. */
export async function outlineOf(context: Context, regionId: number, version: number | undefined): Promise<{ name: string; geometry: GeometryRecord }> {
  const region = await context.models.regions.findByPk(regionId)
  const geometry = region && (await (version === undefined ? context.models.geometries.findByPk(region.geometryId ?? 0) : context.models.geometries.findOne({ where: { regionId, version } })))
  if (!region || !geometry) throw new ApiError('not-found', version === undefined ? 'There is no such region.' : 'There is no such version of this outline.')
  return { name: region.name, geometry }
}
