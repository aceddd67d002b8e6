import { existsSync } from 'node:fs'
import { join } from 'node:path'
import express, { Router } from 'express'

/** The built client: named-by-hash files for good, the page itself never cached, every page path answers the page. */
export function clientFiles(clientDir: string): Router {
  const router = Router()
  const page = join(clientDir, 'index.html')
  router.use('/assets', express.static(join(clientDir, 'assets'), { index: false, immutable: true, maxAge: '1y', fallthrough: true }))
  router.use('/assets', (_req, res) => {
    res.status(404).type('text').send('There is no such file.')
  })
  router.use(express.static(clientDir, { index: false, maxAge: 0 }))
  router.get('/{*path}', (_req, res) => {
    if (!existsSync(page)) {
      res.status(503).type('text').send('The client is not built. Run: npm run build')
      return
    }
    res.set('Cache-Control', 'no-cache').sendFile(page)
  })
  return router
}
