import { z } from 'zod'
import { saveAnswerSchema, saveConflictSchema, saveRequestSchema } from '#shared/contract/build.ts'
import {
  comparisonQuerySchema,
  comparisonSchema,
  describeRevisionRequestSchema,
  listRevisionsQuerySchema,
  openRevisionSchema,
  restoreRevisionRequestSchema,
  revisionSchema,
} from '#shared/contract/revisions.ts'
import {
  getComparison,
  getRevision,
  patchRevision,
  postRestore,
  postRevision,
  readRevisions,
} from '../controllers/revisionController.ts'
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
    summary: 'The history, newest first, 50 at a time; all or the named ones',
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
  defineRoute({
    method: 'patch',
    path: '/api/builds/:buildId/revisions/:revision',
    policy: 'edit-build',
    summary: 'Give a revision a name or a note, or take them away',
    params: revisionParams,
    body: describeRevisionRequestSchema,
    answers: { 200: revisionSchema },
    controller: patchRevision,
  }),
  defineRoute({
    method: 'post',
    path: '/api/builds/:buildId/revisions/:revision/restore',
    policy: 'edit-build',
    summary: 'Bring an old state back as a new revision, merged with what others did meanwhile',
    params: revisionParams,
    body: restoreRevisionRequestSchema,
    answers: { 201: saveAnswerSchema, 409: saveConflictSchema },
    controller: postRestore,
  }),
  defineRoute({
    method: 'get',
    path: '/api/builds/:buildId/comparison',
    policy: 'see-build',
    summary: 'What changed from one revision to another: in words, findings gained and lost, margins',
    params: buildParams,
    query: comparisonQuerySchema,
    answers: { 200: comparisonSchema },
    controller: getComparison,
  }),
]
