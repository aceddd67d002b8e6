import { createHash } from 'node:crypto'
import type { Router } from 'express'
import { quantityWord } from '../../shared/quantity-word'
import { endpoints } from '../../shared/schemas/endpoints'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { feedOf, knownLayer, layerCell, layerTile, pictureKey, surveyOf, tileKey } from '../pipeline/layer-pictures'
import { emptyTile } from '../pictures/empty-tile'
import { markSuspect } from '../pipeline/mark-suspect'
import { usualHere } from '../pipeline/usual-here'
import { layerRows } from '../queries/layer-rows'
import { cursorId, pageOf } from './paging'
import { serve } from './serve'
import { tilePlace } from './tile-place'

export function layerRoutes(router: Router, context: Context): void {
  const one = async (id: number) => {
    const [layer] = await layerRows(context, { id }, null, 1)
    if (!layer) throw new ApiError('not-found', 'There is no such layer.')
    return layer
  }
  serve(router, context, endpoints.listLayers, async ({ query: { limit, cursor, ...wanted } }) =>
    pageOf(await layerRows(context, wanted, cursor === undefined ? null : cursorId(cursor, 0), limit + 1), limit),
  )
  serve(router, context, endpoints.layer, ({ params }) => one(params.id))
  serve(router, context, endpoints.layerTile, async ({ params, query: { theme, show }, req, res }) => {
    const tile = { ...tilePlace(params), theme }
    if (show === 'departure') throw new ApiError('bad-request', 'Offing cannot show how far this layer departs from what is usual yet: the cells have no usual values. Ask for show=value.')
    const layer = await knownLayer(context, params.id)
    const feed = await feedOf(context, layer)
    const tag = `"${createHash('sha1').update(tileKey(pictureKey(layer, feed), tile)).digest('base64url')}"`
    // A change of how the feed is read shows within a minute; until then and after, an unchanged tile is not sent twice.
    res.set({ ETag: tag, 'Cache-Control': 'private, max-age=60' })
    if (req.get('If-None-Match') === tag) {
      res.status(304).end()
      return
    }
    const picture = await layerTile(context, layer, tile, feed)
    res.type('png').end(picture === null ? emptyTile : Buffer.from(picture))
  })
  serve(router, context, endpoints.layerLegend, async ({ params }) => {
    const layer = await knownLayer(context, params.id)
    const feed = await feedOf(context, layer)
    const period = layer.endsAt === null ? null : { from: new Date(layer.observedAt).toISOString(), to: new Date(layer.endsAt).toISOString() }
    return { layerId: layer.id, quantity: quantityWord(feed), unit: feed.unit, period, ...(await surveyOf(context, layer, feed)) }
  })
  serve(router, context, endpoints.layerPoint, async ({ params, query: { lat, lon, usual } }) => {
    const layer = await knownLayer(context, params.id)
    const { unit } = await feedOf(context, layer)
    const point = await layerCell(context, layer, lat, lon)
    return { layerId: layer.id, latitude: lat, longitude: lon, unit, ...point, usual: usual === 'true' ? await usualHere(context, layer, point.cell) : null }
  })
  serve(router, context, endpoints.markLayerSuspect, async ({ person, params, body }) => {
    await markSuspect(context, person, params.id, body)
    return one(params.id)
  })
}
