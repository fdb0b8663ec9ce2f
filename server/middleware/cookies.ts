import type { CookieOptions, Request, Response } from 'express'
import type { Config } from '../config.ts'
import { sessionTimes_ms, type IssuedSession } from '../services/sessionService.ts'

type CookieName = 'access' | 'refresh' | 'visit' | 'guest'

const isSecure = (config: Config): boolean => config.publicUrl?.startsWith('https:') === true

/** Over https the names carry the prefix by which browsers keep other hosts from setting them. */
const nameOf = (config: Config, name: CookieName): string => `${isSecure(config) ? '__Host-' : ''}bayloom-${name}`

const options = (config: Config): CookieOptions => ({
  httpOnly: true,
  sameSite: 'strict',
  secure: isSecure(config),
  path: '/',
})

export function readCookie(config: Config, request: Request, name: CookieName): string | null {
  const cookies = request.cookies as Record<string, unknown>
  const value = cookies[nameOf(config, name)]
  return typeof value === 'string' && value !== '' ? value : null
}

/** Ties an anonymous browser to its token against forged requests. */
export function writeVisitCookie(config: Config, response: Response, visit: string): void {
  response.cookie(nameOf(config, 'visit'), visit, options(config))
}

export function writeSessionCookies(config: Config, response: Response, session: IssuedSession): void {
  response.cookie(nameOf(config, 'access'), session.accessToken, {
    ...options(config),
    maxAge: sessionTimes_ms.access,
  })
  if (session.refreshToken === null) return
  response.cookie(nameOf(config, 'refresh'), session.refreshToken, {
    ...options(config),
    maxAge: sessionTimes_ms.refresh,
  })
}

export function clearSessionCookies(config: Config, response: Response): void {
  response.clearCookie(nameOf(config, 'access'), options(config))
  response.clearCookie(nameOf(config, 'refresh'), options(config))
}

/** No longer than this a browser is known as a guest without giving the name again. */
const longestVisit_ms = 30 * 24 * 3_600_000

/** Knows a guest of a link again, until the link ends: a phone forgets cookies of the open browser within the hour. */
export function writeGuestCookie(config: Config, response: Response, token: string, until: Date): void {
  const maxAge = Math.min(until.getTime() - Date.now(), longestVisit_ms)
  response.cookie(nameOf(config, 'guest'), token, { ...options(config), maxAge })
}

export function clearGuestCookie(config: Config, response: Response): void {
  response.clearCookie(nameOf(config, 'guest'), options(config))
}
