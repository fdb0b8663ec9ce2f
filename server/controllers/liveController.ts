import type { z } from 'zod'
import type { Author } from '#shared/contract/activity.ts'
import type { buildEventsQuerySchema, presenceRequestSchema } from '#shared/contract/live.ts'
import type { ReadNotices } from '#shared/contract/notifications.ts'
import type { Reader } from '../events/access.ts'
import { streamHeaders } from '../events/stream.ts'
import { nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { listActivity } from '../services/activityService.ts'
import { listNotices, readNotices } from '../services/notificationService.ts'
import { Refusal } from '../services/refusal.ts'
import { signedInOf, userOf } from './signedIn.ts'

/** Who asks: a person of the build, or a guest of one of its links. */
function whoOf(call: Call): { reader: Reader; by: Author } {
  const { guest } = call
  if (guest)
    return { reader: { kind: 'guest', guestId: guest.id }, by: { kind: 'guest', guestId: guest.id, name: guest.name } }
  const { sessionId, user } = signedInOf(call)
  return {
    reader: { kind: 'member', userId: user.id, sessionId },
    by: { kind: 'member', userId: user.id, name: user.name },
  }
}

/** Whoever does not ask for a stream would wait for its end without end. */
function refuseOthers(call: Call): void {
  if (!(call.request.get('accept') ?? '').includes('text/event-stream'))
    throw new Refusal('bad-input', {
      detail: 'This address answers with server-sent events: ask for "text/event-stream".',
    })
}

export function streamBuild(call: Call<{ buildId: string }, z.output<typeof buildEventsQuerySchema>>): Answer {
  refuseOthers(call)
  const last = Number(call.request.get('last-event-id') ?? '')
  const after = Number.isSafeInteger(last) && last > 0 ? last : (call.query.after ?? null)
  const visit = {
    ...whoOf(call),
    address: call.request.ip ?? '',
    buildId: call.params.buildId,
    tab: call.query.tab ?? null,
    after,
  }
  return { status: 200, headers: streamHeaders, stream: (response) => call.context.live.open(response, visit) }
}

export function streamPerson(call: Call): Answer {
  refuseOthers(call)
  const visit = { ...whoOf(call), address: call.request.ip ?? '', buildId: null, tab: null, after: null }
  return { status: 200, headers: streamHeaders, stream: (response) => call.context.live.open(response, visit) }
}

export async function putPresence(
  call: Call<{ buildId: string }, unknown, z.output<typeof presenceRequestSchema>>,
): Promise<Answer> {
  await call.context.live.choose(call.params.buildId, call.body.tab, whoOf(call).by, call.body.chosen)
  return nothing
}

export async function readActivity({
  context,
  params,
  query,
}: Call<{ buildId: string }, { before?: number | undefined }>): Promise<Answer> {
  return ok(await listActivity(context, params.buildId, query.before))
}

export async function readNotifications(call: Call<unknown, { before?: number | undefined }>): Promise<Answer> {
  return ok(await listNotices(call.context, userOf(call).id, call.query.before))
}

export async function postRead(call: Call<unknown, unknown, ReadNotices>): Promise<Answer> {
  return ok(await readNotices(call.context, userOf(call).id, call.body))
}
