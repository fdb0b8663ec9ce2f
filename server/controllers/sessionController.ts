import type { Request, Response } from 'express'
import type { z } from 'zod'
import type { registerRequestSchema, Session, signInRequestSchema } from '#shared/contract/session.ts'
import { demoAccounts } from '../db/demoAccounts.ts'
import { created, nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { clearGuestCookie, clearSessionCookies, readCookie, writeSessionCookies } from '../middleware/cookies.ts'
import { csrfToken } from '../middleware/csrf.ts'
import { identifyGuest } from '../middleware/identify.ts'
import { awaitsFirstAccount, register } from '../services/accountService.ts'
import type { Context } from '../services/context.ts'
import { toGuestSession } from '../services/guestService.ts'
import { noteBrowser } from '../services/ownSessionService.ts'
import { endSession, signIn, type IssuedSession, type SignedIn } from '../services/sessionService.ts'

export async function readSession({ context, request, response, signedIn }: Call): Promise<Answer> {
  return ok(await toSession(context, request, response, signedIn))
}

export async function createSession(
  call: Call<unknown, unknown, z.output<typeof signInRequestSchema>>,
): Promise<Answer> {
  const issued = await signIn(call.context, call.body.email, call.body.password)
  return ok(await startSession(call, issued))
}

export async function createAccount(
  call: Call<unknown, unknown, z.output<typeof registerRequestSchema>>,
): Promise<Answer> {
  const issued = await register(call.context, call.body)
  return created(await startSession(call, issued))
}

export async function deleteSession({ context, response, signedIn }: Call): Promise<Answer> {
  if (signedIn) await endSession(signedIn.sessionId, 'signed out')
  clearSessionCookies(context.config, response)
  return nothing
}

/** Puts a new session into the browser; one that it had before ends. */
async function startSession(call: Call, issued: IssuedSession): Promise<Session> {
  if (call.signedIn) await endSession(call.signedIn.sessionId, 'signed in anew')
  await noteBrowser(issued.sessionId, call.request.get('user-agent'))
  writeSessionCookies(call.context.config, call.response, issued)
  return toSession(call.context, call.request, call.response, issued)
}

async function toSession(
  context: Context,
  request: Request,
  response: Response,
  signedIn: SignedIn | null,
): Promise<Session> {
  const guest = await identifyGuest(context, request)
  const visitEnded = guest === null && readCookie(context.config, request, 'guest') !== null
  if (visitEnded) clearGuestCookie(context.config, response)
  return {
    user: signedIn?.user ?? null,
    guest: guest && toGuestSession(guest),
    visitEnded,
    csrfToken: csrfToken(context, request, response, signedIn),
    firstAccount: signedIn === null && (await awaitsFirstAccount()),
    demoAccounts: context.config.demo
      ? demoAccounts.map(({ email, password, name, what }) => ({ email, password, name, what }))
      : [],
  }
}
