import { z } from 'zod'
import { linkKindSchema, type LinkKind } from './guest.ts'
import { personNameSchema } from './session.ts'

/** What the people who come by each kind of link may do, for screens and mails. */
export const linkKindWords: Readonly<Record<LinkKind, string>> = {
  read: 'may read everything in this build',
  review: 'may read everything in this build, comment, and give a verdict',
}

/** No link lives longer. */
export const longestLink_days = 365
const day_ms = 86_400_000

/** Nobody must be able to guess it by trying: the tries are counted, and this is the least length. */
export const passPhraseSchema = z.string().min(8, 'use at least 8 characters').max(200)

/** POST /api/builds/:buildId/links. `days`: how long it works, counted from now. */
export const makeLinkRequestSchema = z.strictObject({
  kind: linkKindSchema,
  label: z.string().trim().min(1, 'say whom the link is for').max(80),
  days: z.int().min(1, 'at least one day').max(longestLink_days, 'at most a year'),
  passPhrase: passPhraseSchema.optional(),
})
export type MakeLinkRequest = z.infer<typeof makeLinkRequestSchema>

/** Whole days from now to the end of a date, as the browser counts them. */
export const daysUntil = (end_ms: number, now_ms: number): number => Math.ceil((end_ms - now_ms) / day_ms)

/** Somebody who came by a link. `left`: they went by themselves; `closed out`: an owner shut the door. */
export const linkGuestSchema = z.object({
  id: z.string(),
  name: z.string(),
  joinedAt: z.string(),
  lastSeenAt: z.string(),
  state: z.enum(['here', 'left', 'closed out']),
})
export type LinkGuest = z.infer<typeof linkGuestSchema>

export const buildLinkSchema = z.object({
  id: z.string(),
  kind: linkKindSchema,
  label: z.string(),
  hasPassPhrase: z.boolean(),
  madeBy: z.string().nullable(),
  madeAt: z.string(),
  expiresAt: z.string(),
  revokedAt: z.string().nullable(),
  state: z.enum(['open', 'expired', 'revoked']),
  guests: z.array(linkGuestSchema),
})
export type BuildLink = z.infer<typeof buildLinkSchema>

/** Answer 201. The token is in no other answer: the database keeps its hash alone. */
export const madeLinkSchema = z.object({ link: buildLinkSchema, token: z.string() })
export type MadeLink = z.infer<typeof madeLinkSchema>

/** GET /api/links/:token: what the arrival page says. Behind a pass phrase the build's name comes later. */
export const linkViewSchema = z.object({
  kind: linkKindSchema,
  needsPassPhrase: z.boolean(),
  expiresAt: z.string(),
  buildName: z.string().nullable(),
  madeBy: z.string().nullable(),
  /** Set where whoever asks is in the build already: as a member, or as a guest of this very link. */
  inside: z.object({ buildId: z.string(), as: z.enum(['member', 'guest']), name: z.string() }).nullable(),
})
export type LinkView = z.infer<typeof linkViewSchema>

/** POST /api/links/:token/guests */
export const joinRequestSchema = z.strictObject({ name: personNameSchema, passPhrase: z.string().max(200).optional() })
export type JoinRequest = z.infer<typeof joinRequestSchema>
export const joinedSchema = z.object({ buildId: z.string() })
