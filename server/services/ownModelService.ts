import { formatPath, type DocumentProblem } from '#shared/build/problems.ts'
import type { CatalogIndex } from '#shared/catalog/catalog.ts'
import type { Model } from '#shared/catalog/model.ts'
import { modelProblems } from '#shared/catalog/modelProblems.ts'
import type { OwnModel as OwnModelView } from '#shared/contract/catalog.ts'
import { OwnModel } from '../models/index.ts'
import type { Context } from './context.ts'
import { photoVersions } from './modelPhotoService.ts'
import { Refusal } from './refusal.ts'

/** Models that one person may keep. */
const most = 1000

/** A person's own library, newest change first. */
export async function listOwnModels(userId: string): Promise<OwnModelView[]> {
  const [models, photos] = await Promise.all([
    OwnModel.findAll({ where: { userId }, order: [['changedAt', 'DESC']] }),
    photoVersions(userId),
  ])
  return models.map((own) => toView(own, photos.get(own.modelId)))
}

/** Adds a model to a person's library, or writes over the one of the same id. */
export async function putOwnModel(context: Context, userId: string, model: Model): Promise<OwnModelView> {
  const errors = problemsOfModel(model, (await context.catalog.current()).index)
  if (errors.length > 0) throw new Refusal('bad-input', { errors })
  if ((await OwnModel.count({ where: { userId } })) >= most)
    throw new Refusal('bad-input', { detail: `An own library holds at most ${most} models.` })
  const [saved] = await OwnModel.upsert({ userId, modelId: model.id, model, changedAt: new Date() })
  return toView(saved, (await photoVersions(userId)).get(model.id))
}

/** What a model gets wrong against the connector types and classes of the catalog, by its place in the request. */
function problemsOfModel(model: Model, index: CatalogIndex): DocumentProblem[] {
  const problems: DocumentProblem[] = []
  modelProblems(model, index.connectorTypes, new Set(index.classes.keys()), (path, message) =>
    problems.push({ path: formatPath(['model', ...path]), message }),
  )
  return problems
}

export async function removeOwnModel(userId: string, modelId: string): Promise<void> {
  if ((await OwnModel.destroy({ where: { userId, modelId } })) === 0) throw new Refusal('not-found')
}

const toView = (own: OwnModel, photo: string | undefined): OwnModelView => ({
  id: own.modelId,
  model: own.model,
  changedAt: own.changedAt.toISOString(),
  ...(photo === undefined ? {} : { photo }),
})
