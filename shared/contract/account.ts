import { z } from 'zod'

/** One of one's own sessions: a browser in which one is signed in. */
export const ownSessionSchema = z.object({
  id: z.string(),
  /** The session that asks. */
  current: z.boolean(),
  /** The browser in words, as "Firefox on Linux"; null where it does not say. */
  browser: z.string().nullable(),
  startedAt: z.string(),
  lastSeenAt: z.string(),
  /** It ends by itself by then, used or not. */
  endsAt: z.string(),
})
export type OwnSession = z.infer<typeof ownSessionSchema>

/** A build that hangs on its only owner. */
export const heldBuildSchema = z.object({ id: z.string(), name: z.string(), others: z.number() })
export type HeldBuild = z.infer<typeof heldBuildSchema>

/** GET /api/account/leaving: what deleting one's account would do. */
export const leavingSchema = z.object({
  /** Others work in them: they have to be handed over first. */
  toHandOver: z.array(heldBuildSchema),
  /** Nobody else is in them: they are deleted with the account. */
  toDelete: z.array(heldBuildSchema),
  /** Builds of others, which stay as they are. */
  toLeave: z.number(),
})
export type Leaving = z.infer<typeof leavingSchema>

/** DELETE /api/account: the password once more. Refused with `last-owner` while builds have to be handed over. */
export const deleteAccountRequestSchema = z.strictObject({
  password: z.string().min(1, 'write your password').max(200),
})

/**
 * POST /api/builds/:id/ownership. The person who hands over stays as owner, stays as editor, or leaves.
 */
export const transferRequestSchema = z.strictObject({
  to: z.uuid(),
  then: z.enum(['owner', 'editor', 'leave']),
})
export type TransferRequest = z.infer<typeof transferRequestSchema>
