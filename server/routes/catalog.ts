import { z } from 'zod'
import { modelSchema } from '#shared/catalog/model.ts'
import { catalogAnswerSchema, exampleSchema, putModelRequestSchema } from '#shared/contract/catalog.ts'
import { putCatalogModel, readCatalog, readExamples } from '../controllers/catalogController.ts'
import { modelParams } from './params.ts'
import { defineRoute } from './route.ts'

export const catalogRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/catalog',
    policy: 'anybody',
    summary: 'The shared catalog, with an ETag',
    answers: { 200: catalogAnswerSchema, 304: null },
    controller: readCatalog,
  }),
  defineRoute({
    method: 'put',
    path: '/api/catalog/models/:modelId',
    policy: 'edit-catalog',
    summary: 'Add a model to the shared catalog, or correct one',
    params: modelParams,
    body: putModelRequestSchema,
    bodyLimit: 'model',
    answers: { 200: modelSchema },
    controller: putCatalogModel,
  }),
  defineRoute({
    method: 'get',
    path: '/api/examples',
    policy: 'signed-in',
    summary: 'Examples that a build can be started from',
    answers: { 200: z.array(exampleSchema) },
    controller: readExamples,
  }),
]
