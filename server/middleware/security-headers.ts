import type { RequestHandler } from 'express'
import helmet from 'helmet'
import type { Context } from '../context'

/** What a page may load: its own files, styles set by the map library, and pictures of the tile server if one is set. */
export function securityHeaders(context: Context): RequestHandler {
  const https = context.env.baseUrl.startsWith('https:')
  const tiles = tileOrigin(context.env.tileUrl)
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        baseUri: ["'self'"],
        connectSrc: ["'self'"],
        fontSrc: ["'self'", 'data:'],
        formAction: ["'self'"],
        frameAncestors: ["'self'"],
        frameSrc: ["'self'"],
        imgSrc: ["'self'", 'data:', 'blob:', ...(tiles ? [tiles] : [])],
        objectSrc: ["'none'"],
        scriptSrc: ["'self'"],
        scriptSrcAttr: ["'none'"],
        styleSrc: ["'self'", "'unsafe-inline'"],
        workerSrc: ["'self'", 'blob:'],
        ...(https ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    strictTransportSecurity: https,
    // Browsers complain about these two on plain http and ignore them.
    crossOriginOpenerPolicy: https,
    originAgentCluster: https,
  })
}

/** Scheme and host of a tile address; a placeholder such as {s} becomes a wildcard. */
export function tileOrigin(tileUrl: string): string | null {
  const match = /^(https?:\/\/)([^/]+)/.exec(tileUrl)
  return match?.[1] && match[2] ? `${match[1]}${match[2].replace(/\{[^}]*\}/g, '*')}` : null
}
