import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { changeRegion, drawRegion, retireRegion } from '../desk/draw-region'
import { importRegions } from '../desk/import-regions'
import { measureOutline } from '../desk/measure-outline'
import { outlineVersions } from '../desk/outline-versions'
import { presentEvent } from '../desk/present-event'
import { presentRegions } from '../desk/present-region'
import { regionBaseline } from '../desk/region-baseline'
import { regionPatches } from '../desk/region-patches'
import { regionSeries } from '../desk/region-series'
import { regionView } from '../desk/region-view'
import { steerHistory } from '../desk/steer-history'
import { singleCells } from '../desk/single-cells'
import { cutAt180 } from '../exports/cut-at-180'
import { smallFile, smallUpload } from '../middleware/small-upload'
import type { RegionRecord } from '../models/region'
import { eventRows } from '../queries/event-rows'
import { serve } from './serve'

const mostImportMegabytes = 10

export function regionRoutes(router: Router, context: Context): void {
  const live = () => context.models.regions.findAll({ where: { retiredAt: null } })
  const one = async (region: RegionRecord) => (await presentRegions(context, [region]))[0]!
  const known = async (id: number) => {
    const region = await context.models.regions.findByPk(id)
    if (!region) throw new ApiError('not-found', 'There is no such region.')
    return region
  }
  serve(router, context, endpoints.listRegions, async ({ query: { limit, cursor } }) => {
    const regions = await presentRegions(context, await live())
    const start = cursor === undefined ? 0 : regions.findIndex((region) => String(region.id) === cursor) + 1
    const items = regions.slice(start, start + limit)
    return { items, nextCursor: start + limit < regions.length ? String(items.at(-1)!.id) : null }
  })
  serve(router, context, endpoints.createRegion, async ({ person, body }) => one(await drawRegion(context, person, body)))
  serve(router, context, endpoints.regionsGeojson, async () => {
    const regions = await presentRegions(context, await live())
    return {
      type: 'FeatureCollection' as const,
      features: regions.map(({ id, name, geometry, areaKm2, timeZone, site, standing }) => ({
        type: 'Feature' as const,
        id,
        geometry: cutAt180(geometry),
        properties: { name, areaKm2, timeZone, site, state: standing.state },
      })),
    }
  })
  serve(router, context, endpoints.measureOutline, ({ body }) => measureOutline(context, body))
  serve(router, context, endpoints.importRegions, ({ person, query, req }) => importRegions(context, person, smallFile(req), { save: query.save === 'true', inland: query.inland === 'true' }), {
    before: [smallUpload(mostImportMegabytes)],
  })
  serve(router, context, endpoints.steerHistory, async ({ person, params, body }) => {
    await steerHistory(context, person, params.id, body.act)
    return one(await known(params.id))
  })
  serve(router, context, endpoints.regionVersions, async ({ params }) => ({ items: await outlineVersions(context, params.id), nextCursor: null }))
  serve(router, context, endpoints.region, async ({ params }) => one(await known(params.id)))
  serve(router, context, endpoints.changeRegion, async ({ person, params, body }) => one(await changeRegion(context, person, params.id, body)))
  serve(router, context, endpoints.retireRegion, ({ person, params }) => retireRegion(context, person, params.id))
  serve(router, context, endpoints.regionCells, ({ params, query }) => singleCells(context, params.id, query.feedId))
  serve(router, context, endpoints.regionView, ({ params, query }) => regionView(context, params.id, query))
  serve(router, context, endpoints.regionPatches, ({ params, query }) => regionPatches(context, params.id, query))
  serve(router, context, endpoints.regionSeries, ({ params, query }) => regionSeries(context, params.id, query))
  serve(router, context, endpoints.regionBaseline, ({ params, query }) => regionBaseline(context, params.id, query))
  serve(router, context, endpoints.regionEvents, async ({ params, query }) => {
    await known(params.id)
    return { items: (await eventRows(context, params.id, query)).map(({ event, alertId, geometryVersion }) => presentEvent(event, alertId, geometryVersion)), nextCursor: null }
  })
}
