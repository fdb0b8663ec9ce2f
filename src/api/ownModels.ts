import { z } from 'zod'
import type { Model } from '#shared/catalog/model.ts'
import { ownModelSchema, type OwnModel } from '#shared/contract/catalog.ts'
import { request, requestNothing, step } from './client.ts'

export const listOwnModels = (signal?: AbortSignal): Promise<OwnModel[]> =>
  request(z.array(ownModelSchema), 'GET', '/api/own-models', { signal })

export const putOwnModel = (model: Model): Promise<OwnModel> =>
  request(ownModelSchema, 'PUT', `/api/own-models/${step(model.id)}`, { body: { model } })

export const deleteOwnModel = (modelId: string): Promise<void> =>
  requestNothing('DELETE', `/api/own-models/${step(modelId)}`)
