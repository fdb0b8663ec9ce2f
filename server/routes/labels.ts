import { labelsRequestSchema } from '#shared/contract/labels.ts'
import { postLabels } from '../controllers/labelController.ts'
import { buildParams } from './params.ts'
import { defineRoute } from './route.ts'

export const labelRoutes = [
  defineRoute({
    method: 'post',
    path: '/api/builds/:buildId/labels',
    policy: 'see-build',
    summary: 'Labels for cable ends, trays and spare leads on sheets, as a PDF',
    params: buildParams,
    body: labelsRequestSchema,
    rateLimit: 'check',
    answers: { 200: null },
    controller: postLabels,
  }),
]
