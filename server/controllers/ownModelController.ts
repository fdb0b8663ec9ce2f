import type { z } from 'zod'
import type { putOwnModelRequestSchema } from '#shared/contract/catalog.ts'
import { nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { listOwnModels, putOwnModel, removeOwnModel } from '../services/ownModelService.ts'
import { refuseOtherId } from './catalogController.ts'
import { userOf } from './signedIn.ts'

export async function readOwnModels(call: Call): Promise<Answer> {
  return ok(await listOwnModels(userOf(call).id))
}

export async function putOwn(
  call: Call<{ modelId: string }, unknown, z.output<typeof putOwnModelRequestSchema>>,
): Promise<Answer> {
  refuseOtherId(call.params.modelId, call.body.model.id)
  return ok(await putOwnModel(call.context, userOf(call).id, call.body.model))
}

export async function deleteOwn(call: Call<{ modelId: string }>): Promise<Answer> {
  await removeOwnModel(userOf(call).id, call.params.modelId)
  return nothing
}
