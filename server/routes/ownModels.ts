import { z } from 'zod'
import { ownModelSchema, photoVersionSchema, putOwnModelRequestSchema } from '#shared/contract/catalog.ts'
import { deleteOwn, putOwn, readOwnModels } from '../controllers/ownModelController.ts'
import { deletePhoto, putPhoto, readPhoto } from '../controllers/modelPhotoController.ts'
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
  defineRoute({
    method: 'put',
    path: '/api/own-models/:modelId/photo',
    policy: 'signed-in',
    summary: 'Keep a photo of the label beside one’s own model',
    params: modelParams,
    takesPhoto: true,
    rateLimit: 'upload',
    answers: { 200: photoVersionSchema },
    controller: putPhoto,
  }),
  defineRoute({
    method: 'get',
    path: '/api/own-models/:modelId/photo',
    policy: 'signed-in',
    summary: 'The photo of the label, as WebP, with an ETag',
    params: modelParams,
    answers: { 200: null, 304: null },
    controller: readPhoto,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/own-models/:modelId/photo',
    policy: 'signed-in',
    summary: 'Remove the photo of the label',
    params: modelParams,
    answers: { 204: null },
    controller: deletePhoto,
  }),
]
