import type { MakeLinkRequest } from '#shared/contract/buildLinks.ts'
import { created, nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { closeOutGuest, listLinks, makeLink, revokeLink } from '../services/buildLinkService.ts'
import { userOf } from './signedIn.ts'

export async function readBuildLinks({ context, params }: Call<{ buildId: string }>): Promise<Answer> {
  return ok(await listLinks(context, params.buildId))
}

export async function postBuildLink(call: Call<{ buildId: string }, unknown, MakeLinkRequest>): Promise<Answer> {
  return created(await makeLink(call.context, userOf(call).id, call.params.buildId, call.body))
}

export async function deleteBuildLink(call: Call<{ buildId: string; linkId: string }>): Promise<Answer> {
  await revokeLink(call.context, userOf(call).id, call.params.buildId, call.params.linkId)
  return nothing
}

export async function deleteBuildGuest({ params }: Call<{ buildId: string; guestId: string }>): Promise<Answer> {
  await closeOutGuest(params.buildId, params.guestId)
  return nothing
}
