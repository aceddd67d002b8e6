import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { emptyTile } from '../pictures/empty-tile'
import { maskChangeOf } from '../pipeline/masks/mask-change'
import { maskTile } from '../pipeline/masks/mask-tiles'
import { presentMasks } from '../pipeline/masks/present-masks'
import { putInForce } from '../pipeline/masks/put-in-force'
import { queueMask } from '../pipeline/masks/queue-mask'
import { serve } from './serve'
import { tilePlace } from './tile-place'

export function maskRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.feedMasks, ({ params }) => presentMasks(context, params.id))
  serve(router, context, endpoints.makeMask, async ({ person, params, body }) => {
    await queueMask(context, person, params.id, body)
    return presentMasks(context, params.id)
  })
  serve(router, context, endpoints.maskChange, ({ params }) => maskChangeOf(context, params.id))
  serve(router, context, endpoints.putMaskInForce, async ({ person, params, body }) => presentMasks(context, await putInForce(context, person, params.id, body)))
  serve(router, context, endpoints.maskTile, async ({ params, query: { theme }, req, res }) => {
    const { tag, picture } = await maskTile(context, params.id, { ...tilePlace(params), theme })
    res.set({ ETag: tag, 'Cache-Control': 'private, max-age=3600' })
    if (req.get('If-None-Match') === tag) {
      res.status(304).end()
      return
    }
    const png = await picture()
    res.type('png').end(png === null ? emptyTile : Buffer.from(png))
  })
}
