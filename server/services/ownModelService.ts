import type { Model } from '#shared/catalog/model.ts'
import type { OwnModel as OwnModelView } from '#shared/contract/catalog.ts'
import { OwnModel } from '../models/index.ts'
import { missingReferences } from './catalogService.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'

/** Models that one person may keep. */
const most = 1000

/** A person's own library, newest change first. */
export async function listOwnModels(userId: string): Promise<OwnModelView[]> {
  const models = await OwnModel.findAll({ where: { userId }, order: [['changedAt', 'DESC']] })
  return models.map(toView)
}

/** Adds a model to a person's library, or writes over the one of the same id. */
export async function putOwnModel(context: Context, userId: string, model: Model): Promise<OwnModelView> {
  const errors = missingReferences(model, (await context.catalog.current()).index, 'model')
  if (errors.length > 0) throw new Refusal('bad-input', { errors })
  if ((await OwnModel.count({ where: { userId } })) >= most)
    throw new Refusal('bad-input', { detail: `An own library holds at most ${most} models.` })
  const [saved] = await OwnModel.upsert({ userId, modelId: model.id, model, changedAt: new Date() })
  return toView(saved)
}

export async function removeOwnModel(userId: string, modelId: string): Promise<void> {
  if ((await OwnModel.destroy({ where: { userId, modelId } })) === 0) throw new Refusal('not-found')
}

const toView = (own: OwnModel): OwnModelView => ({
  id: own.modelId,
  model: own.model,
  changedAt: own.changedAt.toISOString(),
})
