import { saveConflictSchema } from '#shared/contract/build.ts'
import { NetworkError, ProblemError, UnexpectedAnswerError } from '../../api/errors.ts'
import { SaveFailure } from './failure.ts'

/** Refusals that pass by themselves. */
const passing = new Set(['unavailable', 'internal', 'too-many-requests', 'forged-request'])

/** Tells the saver what a failed request means for the edits. */
export function toFailure(error: unknown): unknown {
  if (error instanceof NetworkError) return new SaveFailure('offline', error.message)
  if (error instanceof UnexpectedAnswerError) return new SaveFailure('offline', error.message)
  if (!(error instanceof ProblemError)) return error
  if (error.code === 'not-signed-in') return new SaveFailure('session', error.message)
  if (passing.has(error.code)) return new SaveFailure('offline', error.message)
  const conflict = error.code === 'conflict' ? saveConflictSchema.safeParse(error.body) : null
  if (conflict?.success) return new SaveFailure('conflict', error.message, conflict.data)
  const places = error.errors.slice(0, 2).map((one) => one.message)
  return new SaveFailure('refused', [error.message, ...places].join('; '))
}

/** Runs a request so that its failure is one the saver knows. */
export async function asSave<T>(request: Promise<T>): Promise<T> {
  try {
    return await request
  } catch (error) {
    throw toFailure(error)
  }
}
