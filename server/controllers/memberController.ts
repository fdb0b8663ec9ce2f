import type { TransferRequest } from '#shared/contract/account.ts'
import type { BuildRole } from '#shared/contract/build.ts'
import { nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { listInvitations } from '../services/invitationService.ts'
import { changeMember, listMembers, removeMember } from '../services/memberService.ts'
import { transferOwnership } from '../services/ownershipService.ts'
import { userOf } from './signedIn.ts'

/** Invitations are shown to owners only: they hold addresses of people who have not agreed to anything yet. */
export async function readMembers({ context, params, buildRole }: Call<{ buildId: string }>): Promise<Answer> {
  const members = await listMembers(context, params.buildId)
  return ok({ members, invitations: buildRole === 'owner' ? await listInvitations(params.buildId) : [] })
}

type OfMember = { buildId: string; userId: string }

export async function patchMember(call: Call<OfMember, unknown, { role: BuildRole }>): Promise<Answer> {
  return ok(await changeMember(call.context, userOf(call).id, call.params, call.body.role))
}

export async function deleteMember(call: Call<OfMember>): Promise<Answer> {
  await removeMember(call.context, userOf(call).id, call.params)
  return nothing
}

export async function postOwnership(call: Call<{ buildId: string }, unknown, TransferRequest>): Promise<Answer> {
  await transferOwnership(call.context, call.params.buildId, userOf(call).id, call.body)
  return nothing
}
