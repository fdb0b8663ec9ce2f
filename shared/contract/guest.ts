import { z } from 'zod'

export const linkKinds = ['read', 'review'] as const
export const linkKindSchema = z.enum(linkKinds)
export type LinkKind = z.infer<typeof linkKindSchema>

/** Somebody who came by a link, as they see themselves. */
export const guestSchema = z.object({ id: z.string(), name: z.string(), right: linkKindSchema })
export type Guest = z.infer<typeof guestSchema>

/** The guest that a browser is, and where. */
export const guestSessionSchema = guestSchema.extend({ buildId: z.string(), buildName: z.string() })
export type GuestSession = z.infer<typeof guestSessionSchema>
