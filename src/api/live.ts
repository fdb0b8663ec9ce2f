import { activityPageSchema, type ActivityPage } from '#shared/contract/live.ts'
import { noticePageSchema, unreadSchema, type NoticePage, type ReadNotices } from '#shared/contract/notifications.ts'
import { request, requestNothing, step } from './client.ts'

const path = (buildId: string, rest: string): string => `/api/builds/${step(buildId)}/${rest}`

/** Address of a build's stream of events, from the line after `after` on. */
export function buildEventsPath(buildId: string, tab: string, after: number | null): string {
  const query = new URLSearchParams({ tab, ...(after === null ? {} : { after: String(after) }) })
  return path(buildId, `events?${query}`)
}
export const personEventsPath = '/api/events'

export const listActivity = (buildId: string, before?: number, signal?: AbortSignal): Promise<ActivityPage> =>
  request(activityPageSchema, 'GET', path(buildId, 'activity'), { query: { before }, signal })

/** Whoever has no session any more simply is not shown: nobody is asked to sign in for that. */
export const putPresence = (buildId: string, tab: string, chosen: readonly string[]): Promise<void> =>
  requestNothing('PUT', path(buildId, 'presence'), { body: { tab, chosen }, anonymous: true })

export const listNotices = (before?: number, signal?: AbortSignal): Promise<NoticePage> =>
  request(noticePageSchema, 'GET', '/api/notifications', { query: { before }, signal })

export const readNotices = (which: ReadNotices): Promise<{ unread: number }> =>
  request(unreadSchema, 'POST', '/api/notifications/read', { body: which })
