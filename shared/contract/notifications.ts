import { z } from 'zod'
import { activitySchema } from './activity.ts'

/** Why somebody is told of something. */
export const noticeReasons = [
  'mention',
  'reply',
  'comment',
  'review-asked',
  'verdict',
  'approval-lapsed',
  'round-closed',
  'people',
] as const
export const noticeReasonSchema = z.enum(noticeReasons)
export type NoticeReason = z.infer<typeof noticeReasonSchema>

/** One notification: a line of activity that concerns the person. Its id is the line's. */
export const noticeSchema = z.object({
  id: z.number(),
  buildName: z.string(),
  reason: noticeReasonSchema,
  read: z.boolean(),
  activity: activitySchema,
})
export type Notice = z.infer<typeof noticeSchema>

/** GET /api/notifications, newest first. */
export const listNoticesQuerySchema = z.strictObject({
  before: z.coerce.number().int().min(1).max(Number.MAX_SAFE_INTEGER).optional(),
})
export const noticePageSchema = z.object({ items: z.array(noticeSchema), more: z.boolean(), unread: z.number() })
export type NoticePage = z.infer<typeof noticePageSchema>

/** POST /api/notifications/read: one, or all up to the newest one that was seen. */
export const readNoticesRequestSchema = z.union([
  z.strictObject({ id: z.int().min(1) }),
  z.strictObject({ upTo: z.int().min(1) }),
])
export type ReadNotices = z.infer<typeof readNoticesRequestSchema>
export const unreadSchema = z.object({ unread: z.number() })
