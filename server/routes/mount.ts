import type { Express, Request, Response } from 'express'
import type { Answer, Call } from '../middleware/call.ts'
import { refuseForged } from '../middleware/csrf.ts'
import { identify, identifyGuest } from '../middleware/identify.ts'
import { parse } from '../middleware/parse.ts'
import { makeRateLimiter, type RateLimiter } from '../middleware/rateLimit.ts'
import { readBody } from '../middleware/readBody.ts'
import { readPhotoBody } from '../middleware/readPhoto.ts'
import { concernsBuild, concernsGuests, may, policies, type Actor, type Verdict } from '../policies/policy.ts'
import { findRole } from '../services/buildService.ts'
import type { Context } from '../services/context.ts'
import { Refusal } from '../services/refusal.ts'
import type { AnyRoute } from './route.ts'

/**
 * Puts the route table into the app. Every request goes the same way: who asks, may they at all, is it forged, may they
 * do this to that, is it well-formed, is it too often; then the controller.
 * @throws where a route names no policy.
 */
export function mountRoutes(app: Express, context: Context, routes: readonly AnyRoute[]): void {
  for (const route of routes) {
    if (!Object.hasOwn(policies, route.policy ?? ''))
      throw new Error(`${route.method.toUpperCase()} ${route.path} names no policy`)
    const limiter = route.rateLimit === undefined ? null : makeRateLimiter(route.rateLimit, context.config)
    app[route.method](route.path, (request, response) => handle(context, route, limiter, request, response))
  }
  refuseOtherMethods(app, routes)
}

async function handle(
  context: Context,
  route: AnyRoute,
  limiter: RateLimiter | null,
  request: Request,
  response: Response,
): Promise<void> {
  const signedIn = await identify(context, request, response)
  const actor = signedIn?.user ?? null
  response.locals['user'] = actor?.id
  const visiting = concernsGuests(route.policy) ? await identifyGuest(context, request) : null
  if (!visiting && may(actor, route.policy) === 'sign-in') throw new Refusal('not-signed-in')
  if (route.method !== 'get' && !route.isOneClick) refuseForged(context, request, signedIn)

  const params = readParams(route, request)
  const buildRole = concernsBuild(route.policy) && actor ? await findRole(context, buildIdOf(params), actor.id) : null
  const guest = buildRole === null && visiting?.buildId === buildIdOf(params) ? visiting : null
  refuse(may(actor, route.policy, { buildRole, guest: guest?.right ?? null, self: isSelf(params, actor) }))

  const call: Call = {
    context,
    actor,
    signedIn,
    buildRole,
    guest,
    params,
    query: route.query ? parse(route.query, { ...request.query }) : undefined,
    body: await readAnyBody(route, request, response),
    request,
    response,
  }
  await limiter?.count(call)
  const answer = await route.controller(call)
  await limiter?.succeeded(call)
  await send(response, answer)
}

async function readAnyBody(route: AnyRoute, request: Request, response: Response): Promise<unknown> {
  if (route.takesPhoto) return readPhotoBody(request, response)
  return route.body ? parse(route.body, await readBody(request, response, route.bodyLimit ?? 'small')) : undefined
}

/** An address whose ids cannot be ids leads nowhere. */
function readParams(route: AnyRoute, request: Request): unknown {
  if (!route.params) return {}
  const parsed = route.params.safeParse(request.params)
  if (!parsed.success) throw new Refusal('not-found')
  return parsed.data
}

const buildIdOf = (params: unknown): string => (params as { buildId?: string }).buildId ?? ''

const isSelf = (params: unknown, actor: Actor): boolean =>
  actor !== null && (params as { userId?: string }).userId === actor.id

function refuse(verdict: Verdict): void {
  switch (verdict) {
    case 'allow':
      return
    case 'sign-in':
      throw new Refusal('not-signed-in')
    case 'forbid':
      throw new Refusal('forbidden')
    case 'hide':
      throw new Refusal('not-found')
  }
}

async function send(response: Response, answer: Answer): Promise<void> {
  response.status(answer.status).set('Cache-Control', 'no-store')
  if (answer.headers) response.set(answer.headers)
  if (answer.stream) await answer.stream(response)
  else if (answer.body === undefined) response.end()
  else if (typeof answer.body === 'string' || Buffer.isBuffer(answer.body)) response.send(answer.body)
  else response.json(answer.body)
}

function refuseOtherMethods(app: Express, routes: readonly AnyRoute[]): void {
  const byPath = new Map<string, string[]>()
  for (const { path, method } of routes) byPath.set(path, [...(byPath.get(path) ?? []), method.toUpperCase()])
  for (const [path, methods] of byPath)
    app.all(path, (_request, response) => {
      response.set('Allow', methods.join(', '))
      throw new Refusal('bad-method')
    })
}
