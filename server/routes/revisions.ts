import { z } from 'zod'
import {
  listRevisionsQuerySchema,
  openRevisionSchema,
  revisionSchema,
  saveAnswerSchema,
  saveConflictSchema,
  saveRequestSchema,
} from '#shared/contract/build.ts'
import { getRevision, postRevision, readRevisions } from '../controllers/revisionController.ts'
import { buildParams, revisionParams } from './params.ts'
import { defineRoute } from './route.ts'

export const revisionRoutes = [
  defineRoute({
    method: 'post',
    path: '/api/builds/:buildId/revisions',
    policy: 'edit-build',
    summary: 'Save edits as a new revision, merged with what others did meanwhile',
    params: buildParams,
    body: saveRequestSchema,
    bodyLimit: 'document',
    answers: { 201: saveAnswerSchema, 409: saveConflictSchema },
    controller: postRevision,
  }),
  defineRoute({
    method: 'get',
    path: '/api/builds/:buildId/revisions',
    policy: 'see-build',
    summary: 'The history, newest first, 50 a page',
    params: buildParams,
    query: listRevisionsQuerySchema,
    answers: { 200: z.array(revisionSchema) },
    controller: readRevisions,
  }),
  defineRoute({
    method: 'get',
    path: '/api/builds/:buildId/revisions/:revision',
    policy: 'see-build',
    summary: 'One revision with its document',
    params: revisionParams,
    answers: { 200: openRevisionSchema },
    controller: getRevision,
  }),
]
