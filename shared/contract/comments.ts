import { z } from 'zod'
import { authorSchema } from './activity.ts'

const idSchema = z.string().min(1).max(60)
const keySchema = z.string().min(1).max(400)
const coordinateSchema = z.number().min(-1_000_000).max(1_000_000)

/** What a thread is pinned to. Ids are those of the build document; keys those of the check result or the lid sheet. */
export const pinSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('build') }),
  z.strictObject({ kind: z.literal('part'), part: idSchema }),
  z.strictObject({ kind: z.literal('connector'), part: idSchema, connector: idSchema }),
  z.strictObject({ kind: z.literal('joint'), joint: idSchema }),
  /** `key` of a finding (`shared/check/keys.ts`). */
  z.strictObject({ kind: z.literal('finding'), key: keySchema }),
  /** `key` of a ledger row. */
  z.strictObject({ kind: z.literal('ledger'), key: keySchema }),
  /** Line of the lid sheet. */
  z.strictObject({ kind: z.literal('lid-line'), key: keySchema }),
  /** A spot on the sheet, in the coordinates of the document. */
  z.strictObject({ kind: z.literal('spot'), x: coordinateSchema, y: coordinateSchema }),
])
export type Pin = z.infer<typeof pinSchema>

export const mostCommentLetters = 8_000
/** Source in the few marks of `shared/comments/parse.ts`; a mention is written `@{id of the person}`. */
export const commentTextSchema = z
  .string()
  .trim()
  .min(1, 'write something')
  .max(mostCommentLetters, `a comment may hold ${mostCommentLetters} letters`)

export const commentSchema = z.object({
  id: z.string(),
  by: authorSchema,
  at: z.string(),
  editedAt: z.string().nullable(),
  /** Its text is gone; it stays as a stub because others answered. */
  isDeleted: z.boolean(),
  text: z.string(),
  /** The people mentioned, by their name of today; null: their account is gone. */
  mentions: z.array(z.object({ userId: z.string(), name: z.string().nullable() })),
  /** Written by whoever asks. */
  isMine: z.boolean(),
})
export type Comment = z.infer<typeof commentSchema>

export const threadSchema = z.object({
  id: z.string(),
  /** Counts within the build; shown on the pin. */
  number: z.number(),
  pin: pinSchema,
  /** What it is pinned to, in the words of the time when it was written. */
  about: z.string(),
  /** Revision at which it was written. */
  revision: z.number(),
  /** Revision in which its part or joint was removed; null: still there, or pinned to something else. */
  goneIn: z.number().nullable(),
  resolved: z.object({ by: authorSchema, at: z.string() }).nullable(),
  comments: z.array(commentSchema),
})
export type Thread = z.infer<typeof threadSchema>

export const listThreadsQuerySchema = z.strictObject({
  state: z.enum(['open', 'resolved', 'all']).default('open'),
  of: z.enum(['all', 'mine', 'mentioning-me']).default('all'),
  page: z.coerce.number().int().min(1).max(100_000).default(1),
})
/** Threads on one page of the list. */
export const threadsPerPage = 30
export const threadListSchema = z.object({
  items: z.array(threadSchema),
  total: z.number(),
  page: z.number(),
  /** Open threads of the build, whatever was asked for. */
  open: z.number(),
})
export type ThreadList = z.infer<typeof threadListSchema>

/** Open threads by what they are pinned to: enough to mark the sheet and the lists. The newest 2,000. */
export const pinMarkSchema = z.object({
  threadId: z.string(),
  number: z.number(),
  pin: pinSchema,
  comments: z.number(),
})
export type PinMark = z.infer<typeof pinMarkSchema>

/** `requestId` is made once by the browser: a repeated request makes no second comment. */
export const startThreadRequestSchema = z.strictObject({
  requestId: z.uuid(),
  pin: pinSchema,
  about: z.string().trim().min(1).max(200),
  text: commentTextSchema,
})
export type StartThreadRequest = z.infer<typeof startThreadRequestSchema>
export const replyRequestSchema = z.strictObject({ requestId: z.uuid(), text: commentTextSchema })
export type ReplyRequest = z.infer<typeof replyRequestSchema>
export const editCommentRequestSchema = z.strictObject({ text: commentTextSchema })
export const setThreadStateRequestSchema = z.strictObject({ resolved: z.boolean() })
/** Deleting the only comment of a thread takes the thread with it: null. */
export const deletedCommentSchema = z.object({ thread: threadSchema.nullable() })

/** People who may be mentioned. */
export const mentionableSchema = z.object({ userId: z.string(), name: z.string() })
export type Mentionable = z.infer<typeof mentionableSchema>
