import { findDrivesQuerySchema, foundDrivesSchema } from '#shared/contract/drives.ts'
import { readDrives } from '../controllers/driveController.ts'
import { defineRoute } from './route.ts'

export const driveRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/drives',
    policy: 'signed-in',
    summary: 'Drives of one’s own builds by any part of serial or WWN, 50 at most',
    query: findDrivesQuerySchema,
    answers: { 200: foundDrivesSchema },
    controller: readDrives,
  }),
]
