import { z } from 'zod'
import { checkResultSchema } from '#shared/check/result.ts'
import { postCheck } from '../controllers/checkController.ts'
import { defineRoute } from './route.ts'

export const checkRoutes = [
  defineRoute({
    method: 'post',
    path: '/api/check',
    policy: 'signed-in',
    summary: 'Check a document without saving it',
    body: z.unknown(),
    bodyLimit: 'document',
    rateLimit: 'check',
    answers: { 200: checkResultSchema },
    controller: postCheck,
  }),
]
