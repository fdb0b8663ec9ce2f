import { z } from 'zod'
import { readHealth } from '../controllers/healthController.ts'
import { defineRoute } from './route.ts'

export const healthRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/health',
    policy: 'anybody',
    summary: 'Whether the server and its database answer',
    answers: { 200: z.object({ ok: z.literal(true) }) },
    controller: readHealth,
  }),
]
