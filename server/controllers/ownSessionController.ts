import { nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { endOtherSessions, endOwnSession, listOwnSessions } from '../services/ownSessionService.ts'
import { signedInOf, userOf } from './signedIn.ts'

export async function readOwnSessions(call: Call): Promise<Answer> {
  return ok(await listOwnSessions(call.context, signedInOf(call)))
}

export async function deleteOwnSession(call: Call<{ sessionId: string }>): Promise<Answer> {
  await endOwnSession(userOf(call).id, call.params.sessionId)
  return nothing
}

export async function deleteOtherSessions(call: Call): Promise<Answer> {
  await endOtherSessions(call.context, signedInOf(call))
  return nothing
}
