import type { ErrorRequestHandler, Response } from 'express'
import type { Logger } from 'pino'
import { translateDatabaseError } from '../db/translateError.ts'
import { Refusal, toProblem } from '../services/refusal.ts'
import { withoutTokens } from './logRequests.ts'

/** Refusals that may be somebody trying what they should not. */
const notedRefusals: ReadonlySet<string> = new Set([
  'wrong-credentials',
  'forbidden',
  'forged-request',
  'too-many-requests',
])

const userOf = (response: Response): unknown => (response.locals as { user?: unknown }).user ?? null

/** Every error becomes problem details (RFC 9457). What is not a refusal is logged and told as nothing but that. */
export function errorHandler(log: Logger): ErrorRequestHandler {
  return (error, request, response, _next) => {
    const refusal = toRefusal(error)
    if (refusal.code === 'internal' || refusal.code === 'unavailable')
      log.error({ err: error, method: request.method, path: request.path }, refusal.message)
    if (notedRefusals.has(refusal.code))
      log.warn(
        {
          code: refusal.code,
          method: request.method,
          path: withoutTokens(request.path),
          address: request.ip,
          user: userOf(response),
        },
        'refused',
      )
    if (response.headersSent) {
      response.destroy()
      return
    }
    sendRefusal(response, refusal)
  }
}

export function sendRefusal(response: Response, refusal: Refusal): void {
  const { retryAfter_s } = refusal.details
  if (retryAfter_s !== undefined) response.set('Retry-After', String(retryAfter_s))
  response
    .status(refusal.status)
    .type('application/problem+json')
    .send(JSON.stringify(toProblem(refusal)))
}

/** An error of any library as one of our refusals. */
export function toRefusal(error: unknown): Refusal {
  if (error instanceof Refusal) return error
  return translateDatabaseError(error) ?? translateHttpError(error) ?? new Refusal('internal', { cause: error })
}

/** Errors that the framework and its body reader raise carry a status and, mostly, a type. */
function translateHttpError(error: unknown): Refusal | null {
  if (!(error instanceof Error)) return null
  const { status, type } = error as Error & { status?: unknown; type?: unknown }
  if (type === 'entity.parse.failed')
    return new Refusal('bad-input', { errors: [{ path: '', message: 'the body is not JSON' }], cause: error })
  if (status === 413) return new Refusal('too-large', { cause: error })
  if (status === 415) return new Refusal('not-json', { cause: error })
  if (typeof status === 'number' && status >= 400 && status < 500) return new Refusal('bad-input', { cause: error })
  return null
}
