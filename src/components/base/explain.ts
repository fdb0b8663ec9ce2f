import { NetworkError, ProblemError } from '../../api/errors.ts'

export interface Explained {
  title: string
  detail: string | undefined
  errors: readonly { path: string; message: string }[]
}

/** Something found wrong here, before anything was sent, each place by its path. */
export class PlacedError extends Error {
  readonly errors: readonly { path: string; message: string }[]

  constructor(message: string, errors: readonly { path: string; message: string }[]) {
    super(message)
    this.name = 'PlacedError'
    this.errors = errors
  }
}

/** Any error in words for a person. */
export function explain(error: unknown): Explained {
  if (error instanceof ProblemError) return { title: error.title, detail: detailOf(error), errors: error.errors }
  if (error instanceof PlacedError) return { title: error.message, detail: undefined, errors: error.errors }
  if (error instanceof NetworkError) return { title: 'No connection', detail: error.message, errors: [] }
  return {
    title: 'Something went wrong',
    detail: error instanceof Error ? error.message : undefined,
    errors: [],
  }
}

function detailOf(error: ProblemError): string | undefined {
  if (error.code === 'too-many-requests') return `Try again in ${waitWords(error.retryAfter_s ?? 60)}.`
  return error.message === error.title ? undefined : error.message
}

const waitWords = (seconds: number): string =>
  seconds < 90 ? `${Math.max(1, Math.ceil(seconds))} seconds` : `${Math.ceil(seconds / 60)} minutes`
