import { z } from 'zod'
import { buildRoleSchema } from './build.ts'

/** Who did or wrote something. `former`: the account or the guest's link is gone; their work stays. */
export const authorSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('member'), userId: z.string(), name: z.string() }),
  z.object({ kind: z.literal('guest'), guestId: z.string(), name: z.string() }),
  z.object({ kind: z.literal('former') }),
])
export type Author = z.infer<typeof authorSchema>

const revision = z.number()
const thread = { threadId: z.string(), commentId: z.string() }

/**
 * What happened in a build: one line of its activity, one live event, the cause of mails and notifications. Holds ids and
 * the few words that a list shows, never anything that a guest of the build must not read.
 */
export const happeningSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('revision-saved'), revision, label: z.string() }),
  z.object({ kind: z.literal('revision-named'), revision, name: z.string().nullable() }),
  z.object({ kind: z.literal('revision-restored'), revision, restored: z.number() }),
  z.object({
    kind: z.literal('comment-added'),
    ...thread,
    /** What the thread is pinned to, in words: "W4 outlet 2", "the sheet". */
    about: z.string(),
    excerpt: z.string(),
    /** Ids of the people mentioned in it. */
    mentions: z.array(z.string()),
    /** Ids of the people who wrote in the thread before. */
    repliesTo: z.array(z.string()),
  }),
  z.object({ kind: z.literal('comment-edited'), ...thread }),
  z.object({ kind: z.literal('comment-deleted'), ...thread }),
  z.object({ kind: z.literal('thread-resolved'), threadId: z.string(), about: z.string() }),
  z.object({ kind: z.literal('thread-reopened'), threadId: z.string(), about: z.string() }),
  z.object({
    kind: z.literal('round-asked'),
    roundId: z.string(),
    round: z.number(),
    revision,
    /** Ids of the people asked by name. */
    asked: z.array(z.string()),
    question: z.string(),
  }),
  z.object({
    kind: z.literal('verdict-given'),
    roundId: z.string(),
    round: z.number(),
    revision,
    verdict: z.enum(['approve', 'ask-for-changes']),
    summary: z.string(),
  }),
  z.object({ kind: z.literal('round-closed'), roundId: z.string(), round: z.number() }),
  z.object({ kind: z.literal('approval-lapsed'), roundId: z.string(), round: z.number(), revision }),
  z.object({ kind: z.literal('member-joined'), role: buildRoleSchema }),
  z.object({ kind: z.literal('member-left'), userId: z.string(), name: z.string() }),
  z.object({ kind: z.literal('role-changed'), userId: z.string(), name: z.string(), role: buildRoleSchema }),
  z.object({ kind: z.literal('ownership-transferred'), userId: z.string(), name: z.string() }),
  z.object({ kind: z.literal('link-made'), linkId: z.string(), label: z.string() }),
  z.object({ kind: z.literal('link-revoked'), linkId: z.string(), label: z.string() }),
  z.object({ kind: z.literal('guest-joined'), name: z.string() }),
  z.object({ kind: z.literal('build-archived') }),
  z.object({ kind: z.literal('build-restored') }),
])
export type Happening = z.infer<typeof happeningSchema>
export type HappeningKind = Happening['kind']

/** One line of a build's activity. `id` grows in the order in which things happened. */
export const activitySchema = z.object({
  id: z.number(),
  buildId: z.string(),
  at: z.string(),
  by: authorSchema,
  what: happeningSchema,
})
export type Activity = z.infer<typeof activitySchema>
