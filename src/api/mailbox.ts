import { z } from 'zod'
import { messageSchema, type ListMailbox, type Message } from '#shared/contract/mailbox.ts'
import { request, step } from './client.ts'

export const listMessages = (query: ListMailbox, signal?: AbortSignal): Promise<Message[]> =>
  request(z.array(messageSchema), 'GET', '/api/mailbox', { query: { ...query }, signal })

/** Tries a message again that waits or was given up. */
export const sendAgain = (messageId: string): Promise<Message> =>
  request(messageSchema, 'POST', `/api/mailbox/${step(messageId)}/again`)
