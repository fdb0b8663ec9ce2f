import { z } from 'zod'
import { activitySchema, authorSchema } from './activity.ts'

/** Somebody who has the build open, in one tab, and what they have chosen there: ids of parts and joints. */
export const presentSchema = z.object({ tab: z.string(), by: authorSchema, chosen: z.array(z.string()) })
export type Present = z.infer<typeof presentSchema>

/** Why a stream ended for good: the browser must not come back by itself. */
export const streamEnds = ['session', 'access', 'too-many'] as const

/** What a stream of events carries, by the event's name; each `data` is JSON of its schema. */
export const liveEvents = {
  /** First on every connection: where the stream stands, so that a reader knows what it may have missed. */
  hello: z.object({ lastId: z.number(), revision: z.number().nullable(), present: z.array(presentSchema) }),
  /** One line of the build's activity. Its `id:` is the line's number: a reconnect asks for what came after it. */
  activity: activitySchema,
  /** Everybody who has the build open, whenever that changes. */
  presence: z.array(presentSchema),
  /** Notifications of this person that are not read yet, whenever that changes. */
  notices: z.object({ unread: z.number() }),
  end: z.object({ reason: z.enum(streamEnds) }),
} as const
export type LiveEventName = keyof typeof liveEvents
export type LiveEvent<Name extends LiveEventName> = z.infer<(typeof liveEvents)[Name]>

/** Any event's data, for the API description. */
export const liveEventSchema = z.union([
  liveEvents.hello,
  liveEvents.activity,
  liveEvents.presence,
  liveEvents.notices,
  liveEvents.end,
])

/** GET /api/builds/:buildId/events. `after`: number of the last line known; the browser's Last-Event-ID goes before it. */
export const buildEventsQuerySchema = z.strictObject({
  tab: z.uuid().optional(),
  after: z.coerce.number().int().min(0).max(Number.MAX_SAFE_INTEGER).optional(),
})

/** PUT /api/builds/:buildId/presence: what is chosen in a tab whose stream is open. */
export const presenceRequestSchema = z.strictObject({
  tab: z.uuid(),
  chosen: z.array(z.string().min(1).max(80)).max(12),
})

/** GET /api/builds/:buildId/activity, newest first. `before`: the oldest line already there. */
export const listActivityQuerySchema = z.strictObject({
  before: z.coerce.number().int().min(1).max(Number.MAX_SAFE_INTEGER).optional(),
})
export const activityPageSchema = z.object({ items: z.array(activitySchema), more: z.boolean() })
export type ActivityPage = z.infer<typeof activityPageSchema>
