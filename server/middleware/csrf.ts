import type { Request, Response } from 'express'
import type { Context } from '../services/context.ts'
import { Refusal } from '../services/refusal.ts'
import type { SignedIn } from '../services/sessionService.ts'
import { makeToken, sameText, tag } from '../services/tokens.ts'
import { readCookie, writeVisitCookie } from './cookies.ts'

/**
 * The token that a page sends back with every change: a keyed tag of the session, or, before anybody has signed in, of
 * the browser's visit cookie.
 */
export function csrfToken(context: Context, request: Request, response: Response, signedIn: SignedIn | null): string {
  if (signedIn) return tag(context.secrets.csrf, `session:${signedIn.sessionId}`)
  const known = readCookie(context.config, request, 'visit')
  const visit = known ?? makeToken()
  if (known === null) writeVisitCookie(context.config, response, visit)
  return visitTag(context, visit)
}

const visitTag = (context: Context, visit: string): string => tag(context.secrets.csrf, `visit:${visit}`)

/** Refuses a change that another site's page may have sent. */
export function refuseForged(context: Context, request: Request, signedIn: SignedIn | null): void {
  refuseForeignOrigin(context, request)
  const expected = signedIn
    ? tag(context.secrets.csrf, `session:${signedIn.sessionId}`)
    : expectedOfVisit(context, readCookie(context.config, request, 'visit'))
  const given = request.get('x-csrf-token') ?? ''
  if (expected === null || !sameText(expected, given)) throw new Refusal('forged-request')
}

const expectedOfVisit = (context: Context, visit: string | null): string | null =>
  visit === null ? null : visitTag(context, visit)

/** Browsers say where a request comes from; what they say must be this very address. */
function refuseForeignOrigin(context: Context, request: Request): void {
  const site = request.get('sec-fetch-site')
  if (site !== undefined && site !== 'same-origin' && site !== 'none') throw new Refusal('forged-request')
  const origin = request.get('origin')
  if (origin === undefined) return
  const own = [`${request.protocol}://${request.get('host') ?? ''}`]
  if (context.config.publicUrl !== null) own.push(new URL(context.config.publicUrl).origin)
  if (!own.includes(origin)) throw new Refusal('forged-request')
}
