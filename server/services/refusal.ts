import { problemKinds, type Problem, type ProblemCode } from '#shared/contract/problems.ts'

export interface RefusalDetails {
  detail?: string
  errors?: readonly { path: string; message: string }[]
  retryAfter_s?: number
  /** Further members of the problem detail, as the contract names them. */
  extra?: Readonly<Record<string, unknown>>
  cause?: unknown
}

/** Something that a service does not do, with the reason as a code. Tests and client go by the code. */
export class Refusal extends Error {
  readonly code: ProblemCode
  readonly details: RefusalDetails

  constructor(code: ProblemCode, details: RefusalDetails = {}) {
    super(details.detail ?? problemKinds[code].title, { cause: details.cause })
    this.name = 'Refusal'
    this.code = code
    this.details = details
  }

  get status(): number {
    return problemKinds[this.code].status
  }
}

/** The refusal as problem details (RFC 9457). */
export function toProblem(refusal: Refusal): Problem & Readonly<Record<string, unknown>> {
  const { detail, errors, retryAfter_s, extra } = refusal.details
  const kind = problemKinds[refusal.code]
  return {
    type: `urn:bayloom:problem:${refusal.code}`,
    code: refusal.code,
    title: kind.title,
    status: kind.status,
    ...(detail === undefined ? {} : { detail }),
    ...(errors === undefined ? {} : { errors: [...errors] }),
    ...(retryAfter_s === undefined ? {} : { retryAfter_s }),
    ...extra,
  }
}
