import type { Problem, ProblemCode } from '#shared/contract/problems.ts'

/** The server understood the request and refused it. Go by `code`; `errors` names each bad place by its path. */
export class ProblemError extends Error {
  readonly code: ProblemCode
  readonly status: number
  readonly title: string
  readonly errors: readonly { path: string; message: string }[]
  readonly retryAfter_s: number | undefined
  /** The whole answer, for refusals that carry more than a problem (a save conflict). */
  readonly body: unknown

  constructor(problem: Problem, body: unknown = problem) {
    super(problem.detail ?? problem.title)
    this.name = 'ProblemError'
    this.code = problem.code
    this.status = problem.status
    this.title = problem.title
    this.errors = problem.errors ?? []
    this.retryAfter_s = problem.retryAfter_s
    this.body = body
  }
}

/** No answer came: the connection is down or the server is. Nothing is known of what happened to the request. */
export class NetworkError extends Error {
  constructor(cause: unknown) {
    super('The server does not answer. Check the connection, then try again.', { cause })
    this.name = 'NetworkError'
  }
}

/** An answer came that is not of the agreed shape: another version of the server, or a proxy's own page. */
export class UnexpectedAnswerError extends Error {
  readonly status: number

  constructor(status: number, cause?: unknown) {
    super('The server answered in a form that this page does not know. Reload the page, then try again.', { cause })
    this.name = 'UnexpectedAnswerError'
    this.status = status
  }
}

export const isProblem = (error: unknown, code?: ProblemCode): error is ProblemError =>
  error instanceof ProblemError && (code === undefined || error.code === code)
