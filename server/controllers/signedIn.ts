import type { User } from '#shared/contract/session.ts'
import type { Call } from '../middleware/call.ts'
import { Refusal } from '../services/refusal.ts'
import type { SignedIn } from '../services/sessionService.ts'

/** The session behind a call whose policy lets only signed-in people through. */
export function signedInOf(call: Pick<Call, 'signedIn'>): SignedIn {
  if (!call.signedIn) throw new Refusal('not-signed-in')
  return call.signedIn
}

/** The person behind such a call. */
export const userOf = (call: Pick<Call, 'signedIn'>): User => signedInOf(call).user
