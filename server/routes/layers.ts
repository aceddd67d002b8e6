import { createHash } from 'node:crypto'
import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { knownLayer, layerCell, layerTile } from '../pipeline/layer-pictures'
import { markSuspect } from '../pipeline/mark-suspect'
import { layerRows } from '../queries/layer-rows'
import type { PlacedLayer } from '../queries/layers'
import { cursorId, pageOf } from './paging'
import { serve } from './serve'

/** A picture of nothing: one see-through pixel. */
const emptyTile = Buffer.from('iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAACXBIWXMAAAPoAAAD6AG1e1JrAAAADUlEQVQImWNgYGBgAAAABQABh6FO1AAAAABJRU5ErkJggg==', 'base64')

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
  serve(router, context, endpoints.layerTile, async ({ params: { id, z, x, y }, query: { theme }, req, res }) => {
    const layer = await knownLayer(context, id)
    const tag = `"${createHash('sha1').update(`${shownBy(layer)}:${z}/${x}/${y}:${theme}`).digest('base64url')}"`
    res.set({ ETag: tag, 'Cache-Control': 'private, max-age=86400' })
    if (req.get('If-None-Match') === tag) {
      res.status(304).end()
      return
    }
    const picture = x < 2 ** z && y < 2 ** z ? await layerTile(context, layer, { z, x, y, theme }) : null
    res.type('png').end(picture === null ? emptyTile : Buffer.from(picture))
  })
  serve(router, context, endpoints.layerPoint, async ({ params, query: { lat, lon } }) => {
    const layer = await knownLayer(context, params.id)
    const feed = await context.models.feeds.findByPk(layer.feedId)
    return { layerId: layer.id, latitude: lat, longitude: lon, unit: feed?.unit ?? null, ...(await layerCell(context, layer, lat, lon)) }
  })
  serve(router, context, endpoints.markLayerSuspect, async ({ person, params, body }) => {
    await markSuspect(context, person, params.id, body)
    return one(params.id)
  })
}

/** All that the values of a layer hang on: its file or recipe, and how its feed wants it read. */
function shownBy({ id, checksum, variable, step, recipe, hiddenFlags, storedLog10, fileUnit }: PlacedLayer): string {
  return JSON.stringify([2, id, checksum, variable, step, recipe, hiddenFlags, storedLog10, fileUnit])
}
