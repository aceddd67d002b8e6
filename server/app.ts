import { resolve } from 'node:path'
import express, { Router } from 'express'
import type { Context } from './context'
import { clientFiles } from './middleware/client-files'
import { compressed } from './middleware/compressed'
import { errorReply, unknownPath } from './middleware/error-reply'
import { generalLimit } from './middleware/rate-limits'
import { requestLog } from './middleware/request-log'
import { sameOrigin } from './middleware/same-origin'
import { securityHeaders } from './middleware/security-headers'
import { mountRoutes } from './routes'

export function createApp(context: Context, { clientDir = resolve('dist/client') } = {}): express.Express {
  const app = express()
  app.disable('x-powered-by')
  app.set('trust proxy', context.env.trustProxy)
  app.use(requestLog(context))
  app.use(securityHeaders(context))
  app.use(compressed())
  app.use('/api', apiRouter(context))
  app.use(clientFiles(clientDir))
  app.use(errorReply(context))
  return app
}

function apiRouter(context: Context): Router {
  const router = Router()
  router.use((_req, res, next) => {
    res.set('Cache-Control', 'private, no-cache')
    next()
  })
  router.use(generalLimit(context), sameOrigin(context))
  mountRoutes(router, context)
  router.use(unknownPath)
  return router
}
