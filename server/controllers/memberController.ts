import type { BuildRole } from '#shared/contract/build.ts'
import { nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { listInvitations } from '../services/invitationService.ts'
import { changeMember, listMembers, removeMember } from '../services/memberService.ts'

/** Invitations are shown to owners only: they hold addresses of people who have not agreed to anything yet. */
export async function readMembers({ context, params, buildRole }: Call<{ buildId: string }>): Promise<Answer> {
  const members = await listMembers(context, params.buildId)
  return ok({ members, invitations: buildRole === 'owner' ? await listInvitations(params.buildId) : [] })
}

export async function patchMember({
  context,
  params,
  body,
}: Call<{ buildId: string; userId: string }, unknown, { role: BuildRole }>): Promise<Answer> {
  return ok(await changeMember(context, params.buildId, params.userId, body.role))
}

export async function deleteMember({ context, params }: Call<{ buildId: string; userId: string }>): Promise<Answer> {
  await removeMember(context, params.buildId, params.userId)
  return nothing
}
