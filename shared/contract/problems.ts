import { z } from 'zod'

/** Kinds of refusal, each with its HTTP status and title. Tests and client go by the code, never by words. */
export const problemKinds = {
  'bad-input': { status: 400, title: 'Something in the request cannot be used' },
  'unreadable-document': { status: 422, title: 'The build document cannot be read' },
  'not-signed-in': { status: 401, title: 'Sign in first' },
  'wrong-credentials': { status: 401, title: 'E-mail and password do not match' },
  forbidden: { status: 403, title: 'Not allowed' },
  'forged-request': { status: 403, title: 'The request did not come from this page' },
  'not-found': { status: 404, title: 'Not found' },
  'bad-method': { status: 405, title: 'This address does not take that method' },
  conflict: { status: 409, title: 'Somebody changed this meanwhile' },
  'already-there': { status: 409, title: 'Already there' },
  'last-owner': { status: 409, title: 'A build keeps at least one owner' },
  'last-administrator': { status: 409, title: 'An installation keeps at least one administrator' },
  'link-expired': { status: 410, title: 'The link is used up or too old' },
  'too-large': { status: 413, title: 'Too large' },
  'not-json': { status: 415, title: 'The request body is not JSON' },
  'too-many-requests': { status: 429, title: 'Too many tries' },
  internal: { status: 500, title: 'Something went wrong on our side' },
  unavailable: { status: 503, title: 'The database does not answer' },
} as const
export type ProblemCode = keyof typeof problemKinds

/** Problem details after RFC 9457. `errors` names each bad place by its path. */
export const problemSchema = z.object({
  type: z.string(),
  code: z.enum(Object.keys(problemKinds) as [ProblemCode, ...ProblemCode[]]),
  title: z.string(),
  status: z.number(),
  detail: z.string().optional(),
  errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
  /** Seconds to wait, with `too-many-requests`. */
  retryAfter_s: z.number().optional(),
})
export type Problem = z.infer<typeof problemSchema>
