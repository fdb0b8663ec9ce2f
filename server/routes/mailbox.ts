import { z } from 'zod'
import { listMailboxQuerySchema, messageSchema } from '#shared/contract/mailbox.ts'
import { postAgain, readMailbox } from '../controllers/mailboxController.ts'
import { messageParams } from './params.ts'
import { defineRoute } from './route.ts'

export const mailboxRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/mailbox',
    policy: 'administer-installation',
    summary: 'Messages of the local mailbox, newest first',
    query: listMailboxQuerySchema,
    answers: { 200: z.array(messageSchema) },
    controller: readMailbox,
  }),
  defineRoute({
    method: 'post',
    path: '/api/mailbox/:messageId/again',
    policy: 'administer-installation',
    summary: 'Try a message again that waits or was given up',
    params: messageParams,
    answers: { 200: messageSchema },
    controller: postAgain,
  }),
]
