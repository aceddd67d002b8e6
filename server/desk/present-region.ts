import type { Region } from '../../shared/schemas/regions'
import type { Context } from '../context'
import type { RegionRecord } from '../models/region'
import { byWorry, standings } from './standing'

/** Regions as the interface shows them, by worry. */
export async function presentRegions(context: Context, regions: readonly RegionRecord[]): Promise<Region[]> {
  const only = regions.length === 1 ? regions[0]!.id : undefined
  const standing = await standings(context, only)
  const geometries = await context.models.geometries.findAll({ where: { id: regions.flatMap((region) => region.geometryId ?? []) } })
  const byId = new Map(geometries.map((geometry) => [geometry.id, geometry]))
  const people = await context.models.users.findAll({ attributes: ['id', 'name'], where: { id: regions.flatMap((region) => region.createdBy ?? []) } })
  const names = new Map(people.map((person) => [person.id, person.name]))
  return regions
    .map((region) => {
      const geometry = byId.get(region.geometryId!)!
      return {
        id: region.id,
        name: region.name,
        timeZone: region.timeZone,
        site: region.site,
        contacts: region.contacts,
        shoreBufferKm: geometry.shoreBufferKm,
        opticallyComplex: region.opticallyComplex,
        geometry: geometry.geometry,
        geometryVersion: geometry.version,
        areaKm2: geometry.areaKm2,
        createdAt: new Date(region.createdAt).toISOString(),
        createdBy: region.createdBy === null ? null : (names.get(region.createdBy) ?? null),
        retired: region.retiredAt !== null,
        version: region.version,
        standing: standing.get(region.id) ?? retiredStanding,
        repairs: geometry.repairs,
      }
    })
    .sort(byWorry)
}

const retiredStanding: Region['standing'] = {
  state: 'not ready',
  because: 'This region is retired.',
  feedId: null,
  ruleId: null,
  unit: null,
  severity: null,
  alertId: null,
  view: null,
  seen: [],
  coverageFloor: 0.25,
  progress: null,
}
