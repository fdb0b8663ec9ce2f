import { z } from 'zod'
import { messageSchema, type Message } from '#shared/contract/mailbox.ts'
import { request } from './client.ts'

export const listMessages = (signal?: AbortSignal): Promise<Message[]> =>
  request(z.array(messageSchema), 'GET', '/api/mailbox', { signal })
