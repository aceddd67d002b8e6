import type { Response, Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { presentAlerts } from '../desk/present-alert'
import { regionSeries } from '../desk/region-series'
import { alertsCsv } from '../exports/alerts-csv'
import { seriesCsv } from '../exports/series-csv'
import { alertIds, alertsInOrder } from '../queries/alert-rows'
import { serve } from './serve'

const everyAlert = 100_000

export function exportRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.exportSeries, async ({ params, query, res }) => {
    const series = await regionSeries(context, params.id, query)
    send(res, `offing-region-${params.id}-feed-${series.feedId}.csv`, seriesCsv(series))
  })
  serve(router, context, endpoints.exportAlerts, async ({ query, res }) => {
    const alerts = await alertsInOrder(context, await alertIds(context, query, everyAlert, null))
    send(res, 'offing-alerts.csv', alertsCsv(await presentAlerts(context, alerts)))
  })
}

function send(res: Response, name: string, csv: string): void {
  res.set('Content-Disposition', `attachment; filename="${name}"`)
  res.type('text/csv').end(csv)
}
