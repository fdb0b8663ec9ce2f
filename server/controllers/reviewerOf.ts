import type { Call } from '../middleware/call.ts'
import { Refusal } from '../services/refusal.ts'
import type { Reviewer } from '../services/roundList.ts'
import { userOf } from './signedIn.ts'

/** Whoever came through a policy of a build, as a member or as a guest. */
export function reviewerOf(call: Pick<Call, 'guest' | 'buildRole' | 'signedIn'>): Reviewer {
  if (call.guest) return { guest: call.guest }
  if (!call.buildRole) throw new Refusal('not-found')
  return { userId: userOf(call).id, role: call.buildRole }
}
