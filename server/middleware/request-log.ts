import type { RequestHandler } from 'express'
import { pinoHttp } from 'pino-http'
import type { Context } from '../context'

/** Quiet: calls are logged at debug level (failures are logged by the error reply); never headers, never a secret in a path. */
export function requestLog(context: Context): RequestHandler {
  return pinoHttp({
    logger: context.log,
    quietReqLogger: true,
    customLogLevel: () => 'debug',
    serializers: {
      req: (req: { method: string; url: string }) => ({ method: req.method, url: withoutSecrets(req.url) }),
      res: (res: { statusCode: number }) => ({ status: res.statusCode }),
    },
  })
}

function withoutSecrets(url: string): string {
  return url.replace(/\/(reset-password|invitation)\/[^/?]+/, '/$1/...')
}
