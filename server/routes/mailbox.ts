import { z } from 'zod'
import { messageSchema } from '#shared/contract/mailbox.ts'
import { readMailbox } from '../controllers/mailboxController.ts'
import { defineRoute } from './route.ts'

export const mailboxRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/mailbox',
    policy: 'administer-installation',
    summary: 'Messages of the local mailbox, newest first',
    answers: { 200: z.array(messageSchema) },
    controller: readMailbox,
  }),
]
