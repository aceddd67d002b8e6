import type { Router } from 'express'
import swaggerUi from 'swagger-ui-express'
import type { Context } from '../context'
import { openApiDocument } from './openapi-document'

/** The interface described, for programs and as a page for people. */
export function openApiRoutes(router: Router, context: Context): void {
  let document: Record<string, unknown> | null = null
  router.get('/openapi.json', (_req, res) => {
    document ??= openApiDocument(context)
    res.json(document)
  })
  const page = swaggerUi.setup(undefined, { customSiteTitle: 'Offing: interface', swaggerOptions: { url: '/api/openapi.json' } })
  router.use('/docs', swaggerUi.serve, page)
}
