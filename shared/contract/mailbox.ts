import { z } from 'zod'

/** A message of the local mailbox, which stands in for the mail service. */
export const messageSchema = z.object({
  id: z.string(),
  to: z.string(),
  subject: z.string(),
  text: z.string(),
  html: z.string(),
  state: z.enum(['queued', 'sent', 'failed']),
  queuedAt: z.string(),
  sentAt: z.string().nullable(),
})
export type Message = z.infer<typeof messageSchema>
