import type { JoinRequest } from '#shared/contract/buildLinks.ts'
import { created, nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { clearGuestCookie, writeGuestCookie } from '../middleware/cookies.ts'
import { identifyGuest } from '../middleware/identify.ts'
import { join, leave, viewLink } from '../services/guestService.ts'

type OfLink = Call<{ token: string }>

export async function readLink({ context, actor, params, request }: OfLink): Promise<Answer> {
  return ok(await viewLink(context, params.token, actor, await identifyGuest(context, request)))
}

export async function postGuest(call: Call<{ token: string }, unknown, JoinRequest>): Promise<Answer> {
  const { context, params, body, response } = call
  const { buildId, token, until } = await join(context, params.token, body)
  writeGuestCookie(context.config, response, token, until)
  return created({ buildId })
}

export async function deleteGuest({ context, request, response }: Call): Promise<Answer> {
  const guest = await identifyGuest(context, request)
  if (guest) await leave(guest)
  clearGuestCookie(context.config, response)
  return nothing
}
