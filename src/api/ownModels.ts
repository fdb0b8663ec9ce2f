import { z } from 'zod'
import type { Model } from '#shared/catalog/model.ts'
import { ownModelSchema, photoVersionSchema, type OwnModel } from '#shared/contract/catalog.ts'
import { request, requestNothing, step } from './client.ts'

export const listOwnModels = (signal?: AbortSignal): Promise<OwnModel[]> =>
  request(z.array(ownModelSchema), 'GET', '/api/own-models', { signal })

export const putOwnModel = (model: Model): Promise<OwnModel> =>
  request(ownModelSchema, 'PUT', `/api/own-models/${step(model.id)}`, { body: { model } })

export const deleteOwnModel = (modelId: string): Promise<void> =>
  requestNothing('DELETE', `/api/own-models/${step(modelId)}`)

/** Keeps a photo of the label beside an own model. */
export const putModelPhoto = ({ modelId, file }: { modelId: string; file: Blob }): Promise<{ version: string }> =>
  request(photoVersionSchema, 'PUT', `/api/own-models/${step(modelId)}/photo`, { file })

export const deleteModelPhoto = (modelId: string): Promise<void> =>
  requestNothing('DELETE', `/api/own-models/${step(modelId)}/photo`)

/** Where a page shows the photo from; another version is another address. */
export const photoAddress = (modelId: string, version: string): string =>
  `/api/own-models/${step(modelId)}/photo?v=${encodeURIComponent(version)}`
