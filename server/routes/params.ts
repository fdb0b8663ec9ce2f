import { z } from 'zod'
import { catalogIdSchema } from '#shared/catalog/ids.ts'

const idSchema = z.uuid()

/** Tokens in links are base64url of 256 bits. */
const tokenSchema = z.string().min(20).max(100)

export const buildParams = z.object({ buildId: idSchema })
export const revisionParams = z.object({
  buildId: idSchema,
  revision: z.coerce
    .number()
    .int()
    .min(1)
    .max(2 ** 31 - 1),
})
export const invitationParams = z.object({ buildId: idSchema, invitationId: idSchema })
export const memberParams = z.object({ buildId: idSchema, userId: idSchema })
export const sessionParams = z.object({ sessionId: idSchema })
export const userParams = z.object({ userId: idSchema })
export const linkParams = z.object({ buildId: idSchema, linkId: idSchema })
export const guestParams = z.object({ buildId: idSchema, guestId: idSchema })
export const roundParams = z.object({ buildId: idSchema, roundId: idSchema })
export const threadParams = z.object({ buildId: idSchema, threadId: idSchema })
export const commentParams = z.object({ buildId: idSchema, commentId: idSchema })
export const messageParams = z.object({ messageId: idSchema })
/** What an unsubscribe link carries: kind, address and seal. */
export const sealedParams = z.object({ token: z.string().min(20).max(600) })
export const tokenParams = z.object({ token: tokenSchema })
export const modelParams = z.object({ modelId: catalogIdSchema })
