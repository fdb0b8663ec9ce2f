import { lidSheetRequestSchema } from '#shared/contract/lidSheet.ts'
import { postLidSheet } from '../controllers/lidController.ts'
import { buildParams } from './params.ts'
import { defineRoute } from './route.ts'

export const lidSheetRoutes = [
  defineRoute({
    method: 'post',
    path: '/api/builds/:buildId/lid-sheet',
    policy: 'see-build',
    summary: 'The page for the inside of the lid, as a PDF',
    params: buildParams,
    body: lidSheetRequestSchema,
    rateLimit: 'paper',
    answers: { 200: null },
    controller: postLidSheet,
  }),
]
