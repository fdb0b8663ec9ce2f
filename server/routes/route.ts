import type { z } from 'zod'
import type { Answer, Call } from '../middleware/call.ts'
import type { RateLimitName } from '../middleware/rateLimit.ts'
import type { BodyLimit } from '../middleware/readBody.ts'
import type { PolicyName } from '../policies/policy.ts'

export type Method = 'get' | 'post' | 'put' | 'patch' | 'delete'

/** One line of the route table: method, path and policy, what goes in and comes out, and the controller. */
export interface Route<
  Params extends z.ZodType = z.ZodType,
  Query extends z.ZodType = z.ZodType,
  Body extends z.ZodType = z.ZodType,
> {
  method: Method
  path: string
  policy: PolicyName
  /** For the API description. */
  summary: string
  params?: Params
  query?: Query
  body?: Body
  bodyLimit?: BodyLimit
  /** The body is a picture, not JSON. */
  takesPhoto?: boolean
  rateLimit?: RateLimitName
  /** Sent by mail programs, from anywhere and without our token: what its path carries is the proof. */
  isOneClick?: boolean
  /** The answer is a stream of server-sent events; its schema is that of each event's data. */
  streams?: boolean
  /** Schema of each answer, by status; null where there is no body. */
  answers: Readonly<Record<number, z.ZodType | null>>
  controller: (call: Call<z.output<Params>, z.output<Query>, z.output<Body>>) => Promise<Answer> | Answer
}

/** A route whose own types are kept inside it, so that all of them fit in one list. */
export type AnyRoute = Route

export const defineRoute = <Params extends z.ZodType, Query extends z.ZodType, Body extends z.ZodType>(
  route: Route<Params, Query, Body>,
): AnyRoute => route as unknown as AnyRoute
