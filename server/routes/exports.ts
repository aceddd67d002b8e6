import type { Response, Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { outlineOf } from '../desk/outline-versions'
import { presentAlerts } from '../desk/present-alert'
import { regionSeries } from '../desk/region-series'
import { alertsCsv } from '../exports/alerts-csv'
import { cutAt180 } from '../exports/cut-at-180'
import { outlineKml } from '../exports/outline-kml'
import { seriesCsv } from '../exports/series-csv'
import { alertIds, alertsInOrder } from '../queries/alert-rows'
import { serve } from './serve'

const everyAlert = 100_000

export function exportRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.exportSeries, async ({ params, query, res }) => {
    const series = await regionSeries(context, params.id, query)
    send(res, `offing-region-${params.id}-feed-${series.feedId}.csv`, seriesCsv(series))
  })
  serve(router, context, endpoints.exportOutline, async ({ params, query, res }) => {
    const { name, geometry } = await outlineOf(context, params.id, query.version)
    const { version, areaKm2, shoreBufferKm } = geometry
    const feature = { type: 'Feature', id: params.id, geometry: cutAt180(geometry.geometry), properties: { name, version, areaKm2, shoreBufferKm } }
    sendAs(res, `offing-region-${params.id}-outline-${version}.geojson`, 'application/geo+json', JSON.stringify(feature))
  })
  serve(router, context, endpoints.exportOutlineKml, async ({ params, query, res }) => {
    const { name, geometry } = await outlineOf(context, params.id, query.version)
    sendAs(res, `offing-region-${params.id}-outline-${geometry.version}.kml`, 'application/vnd.google-earth.kml+xml', outlineKml(name, `Outline version ${geometry.version}`, geometry.geometry))
  })
  serve(router, context, endpoints.exportAlerts, async ({ query, res }) => {
    const alerts = await alertsInOrder(context, await alertIds(context, query, everyAlert, null))
    send(res, 'offing-alerts.csv', alertsCsv(await presentAlerts(context, alerts)))
  })
}

function send(res: Response, name: string, csv: string): void {
  sendAs(res, name, 'text/csv', csv)
}

function sendAs(res: Response, name: string, type: string, text: string): void {
  res.set('Content-Disposition', `attachment; filename="${name}"`)
  res.type(type).end(text)
}
