import type { Request, Response } from 'express'
import type { Context } from '../services/context.ts'
import { findGuest, type KnownGuest } from '../services/guestService.ts'
import { readAccessToken, refreshSession, type SignedIn } from '../services/sessionService.ts'
import { clearSessionCookies, readCookie, writeSessionCookies } from './cookies.ts'

/**
 * Who sends this request. An access token that has run out is renewed on the way, so that a person who works never
 * notices; what cannot be renewed is cleared away.
 */
export async function identify(context: Context, request: Request, response: Response): Promise<SignedIn | null> {
  const access = readCookie(context.config, request, 'access')
  const signedIn = access === null ? null : await readAccessToken(context, access)
  if (signedIn) return signedIn
  const refresh = readCookie(context.config, request, 'refresh')
  const renewed = refresh === null ? null : await refreshSession(context, refresh)
  if (renewed) writeSessionCookies(context.config, response, renewed)
  else if (access !== null || refresh !== null) clearSessionCookies(context.config, response)
  return renewed && { sessionId: renewed.sessionId, user: renewed.user }
}

/** The guest behind a request, where it carries the cookie that a link gave. */
export async function identifyGuest(context: Context, request: Request): Promise<KnownGuest | null> {
  const token = readCookie(context.config, request, 'guest')
  return token === null ? null : findGuest(context, token)
}
