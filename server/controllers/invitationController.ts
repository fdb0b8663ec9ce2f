import type { z } from 'zod'
import type { inviteRequestSchema } from '#shared/contract/build.ts'
import { created, nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { acceptInvitation, invite, viewInvitation, withdrawInvitation } from '../services/invitationService.ts'
import { userOf } from './signedIn.ts'

export async function postInvitation(
  call: Call<{ buildId: string }, unknown, z.output<typeof inviteRequestSchema>>,
): Promise<Answer> {
  return created(await invite(call.context, userOf(call), call.params.buildId, call.body))
}

export async function deleteInvitation({ params }: Call<{ buildId: string; invitationId: string }>): Promise<Answer> {
  await withdrawInvitation(params.buildId, params.invitationId)
  return nothing
}

export async function readInvitation({ params }: Call<{ token: string }>): Promise<Answer> {
  return ok(await viewInvitation(params.token))
}

export async function postAcceptance(call: Call<{ token: string }>): Promise<Answer> {
  return ok(await acceptInvitation(call.context, call.params.token, userOf(call)))
}
