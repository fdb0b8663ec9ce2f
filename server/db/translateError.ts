import { BaseError, ConnectionAcquireTimeoutError, ConnectionError, UniqueConstraintError } from 'sequelize'
import { Refusal } from '../services/refusal.ts'

/** Codes of PostgreSQL (appendix A of its manual) and of the socket that mean: nobody answers there just now. */
const awayCodes = new Set([
  '57P01', // admin_shutdown
  '57P02', // crash_shutdown
  '57P03', // cannot_connect_now
  '53300', // too_many_connections
  '08000', // connection_exception
  '08003', // connection_does_not_exist
  '08006', // connection_failure
  'ECONNREFUSED',
  'ECONNRESET',
  'EPIPE',
  'ETIMEDOUT',
  'ENOTFOUND',
])

/** Codes that mean: a value that the database cannot hold, as a NUL in a text. */
const badValueCodes = new Set(['22021', '22P02', '22P05', '22003', '22001'])

const away = (cause: unknown) => new Refusal('unavailable', { retryAfter_s: 5, cause })

/** Turns an error of the database or its driver into a refusal; null where it is none of them. The cause is kept. */
export function translateDatabaseError(error: unknown): Refusal | null {
  if (error instanceof ConnectionError || error instanceof ConnectionAcquireTimeoutError) return away(error)
  if (error instanceof UniqueConstraintError) return new Refusal('already-there', { cause: error })
  const code = codeOf(error)
  if (code !== undefined && awayCodes.has(code)) return away(error)
  if (code !== undefined && badValueCodes.has(code)) return new Refusal('bad-input', { cause: error })
  if (
    error instanceof Error &&
    /Connection terminated|ConnectionManager\.getConnection was called after/.test(error.message)
  )
    return away(error)
  return null
}

function codeOf(error: unknown): string | undefined {
  const source: unknown = error instanceof BaseError && 'original' in error ? error.original : error
  if (typeof source !== 'object' || source === null || !('code' in source)) return undefined
  return typeof source.code === 'string' ? source.code : undefined
}
