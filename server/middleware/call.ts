import type { Request, Response } from 'express'
import type { BuildRole } from '#shared/contract/build.ts'
import type { Actor } from '../policies/policy.ts'
import type { Context } from '../services/context.ts'
import type { KnownGuest } from '../services/guestService.ts'
import type { SignedIn } from '../services/sessionService.ts'

/** What a controller gets: who asks, and the request parsed by the route's schemas. */
export interface Call<Params = unknown, Query = unknown, Body = unknown> {
  context: Context
  actor: Actor
  signedIn: SignedIn | null
  /** Role of the actor in the build of the path, on routes that concern one. */
  buildRole: BuildRole | null
  /** The guest of a link into the build of the path; null where the actor has a role in it. */
  guest: KnownGuest | null
  params: Params
  query: Query
  body: Body
  request: Request
  response: Response
}

/** What a controller answers. */
export interface Answer {
  status: number
  body?: unknown
  headers?: Readonly<Record<string, string>>
  /** Takes over a response whose status and headers are set, instead of a body. */
  stream?: (response: Response) => Promise<void>
}

export const ok = (body: unknown): Answer => ({ status: 200, body })
export const created = (body: unknown): Answer => ({ status: 201, body })
export const nothing: Answer = { status: 204 }
