import type { Catalog } from '#shared/catalog/catalog.ts'
import { modelSchema, type Model } from '#shared/catalog/model.ts'
import { catalogAnswerSchema } from '#shared/contract/catalog.ts'
import { request, step } from './client.ts'

export const readCatalog = (signal?: AbortSignal): Promise<Catalog> =>
  request(catalogAnswerSchema, 'GET', '/api/catalog', { signal })

/** Puts a model into the shared catalog, or corrects one that is there. */
export const putCatalogModel = (model: Model, note?: string): Promise<Model> =>
  request(modelSchema, 'PUT', `/api/catalog/models/${step(model.id)}`, { body: { model, note } })
