import { z } from 'zod'
import { mailKinds } from './mailChoices.ts'

export const messageStates = ['queued', 'sent', 'failed', 'dropped'] as const
/** `dropped`: not sent, because the person left the build before it was their turn. */
export const messageStateSchema = z.enum(messageStates)
export const messageKindSchema = z.enum([...mailKinds, 'password-reset', 'other'])
export type MessageKind = z.infer<typeof messageKindSchema>

/** A message of the local mailbox, which stands in for the mail service. */
export const messageSchema = z.object({
  id: z.string(),
  to: z.string(),
  kind: messageKindSchema,
  subject: z.string(),
  text: z.string(),
  html: z.string(),
  state: messageStateSchema,
  attempts: z.number(),
  lastError: z.string().nullable(),
  queuedAt: z.string(),
  /** When it is tried next, while it waits. */
  nextTryAt: z.string().nullable(),
  sentAt: z.string().nullable(),
})
export type Message = z.infer<typeof messageSchema>

/** GET /api/mailbox */
export const listMailboxQuerySchema = z.strictObject({ state: messageStateSchema.optional() })
export type ListMailbox = z.infer<typeof listMailboxQuerySchema>
