import type { RequestHandler } from 'express'
import type { Logger } from 'pino'
import { pinoHttp } from 'pino-http'

/** One line a request, without headers: those hold the keys of sessions. Tokens in paths are cut. */
export function logRequests(log: Logger): RequestHandler {
  return pinoHttp({
    logger: log,
    customLogLevel: (_request, response) => (response.statusCode >= 500 ? 'error' : 'debug'),
    serializers: {
      req: (request: { method: string; url: string }) => ({ method: request.method, url: withoutTokens(request.url) }),
      res: (response: { statusCode: number }) => ({ status: response.statusCode }),
    },
  }) as RequestHandler
}

/** A path as it may be logged. */
export const withoutTokens = (url: string): string =>
  url.replace(/\/(invitations|password-resets|links|unsubscribe)\/[^/?]{20,}/g, '/$1/…').replace(/\?.*/, '')
