import { z } from 'zod'
import { ownModelSchema, putOwnModelRequestSchema } from '#shared/contract/catalog.ts'
import { deleteOwn, putOwn, readOwnModels } from '../controllers/ownModelController.ts'
import { modelParams } from './params.ts'
import { defineRoute } from './route.ts'

export const ownModelRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/own-models',
    policy: 'signed-in',
    summary: 'One’s own models, newest change first',
    answers: { 200: z.array(ownModelSchema) },
    controller: readOwnModels,
  }),
  defineRoute({
    method: 'put',
    path: '/api/own-models/:modelId',
    policy: 'signed-in',
    summary: 'Keep a model in one’s own library',
    params: modelParams,
    body: putOwnModelRequestSchema,
    bodyLimit: 'model',
    answers: { 200: ownModelSchema },
    controller: putOwn,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/own-models/:modelId',
    policy: 'signed-in',
    summary: 'Remove a model from one’s own library; builds keep their copies',
    params: modelParams,
    answers: { 204: null },
    controller: deleteOwn,
  }),
]
