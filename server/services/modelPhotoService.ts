import { createHash } from 'node:crypto'
import { Op } from 'sequelize'
import { redrawPhoto } from '../files/photo.ts'
import { ModelPhoto, OwnModel } from '../models/index.ts'
import { Refusal } from './refusal.ts'

/** Photos that one person may keep. */
const most = 200
/** How long a photo waits for its removed model to be put back. */
const waits_ms = 24 * 60 * 60 * 1000

/** Keeps a photo of the label beside one's own model, drawn anew. */
export async function putModelPhoto(userId: string, modelId: string, bytes: Buffer): Promise<{ version: string }> {
  if (!(await OwnModel.findOne({ where: { userId, modelId }, attributes: ['modelId'] }))) throw new Refusal('not-found')
  const photo = await redrawPhoto(bytes)
  await dropForgotten(userId, new Date(Date.now() - waits_ms))
  const others = await ModelPhoto.count({ where: { userId, modelId: { [Op.ne]: modelId } } })
  if (others >= most) throw new Refusal('bad-input', { detail: `An own library holds at most ${most} photos.` })
  const version = createHash('sha256').update(photo).digest('base64url').slice(0, 16)
  await ModelPhoto.upsert({ userId, modelId, photo, version, savedAt: new Date() })
  return { version }
}

/** The photo beside one's own model. */
export async function readModelPhoto(userId: string, modelId: string): Promise<ModelPhoto> {
  const [own, photo] = await Promise.all([
    OwnModel.findOne({ where: { userId, modelId }, attributes: ['modelId'] }),
    ModelPhoto.findOne({ where: { userId, modelId } }),
  ])
  if (!own || !photo) throw new Refusal('not-found')
  return photo
}

export async function removeModelPhoto(userId: string, modelId: string): Promise<void> {
  if ((await ModelPhoto.destroy({ where: { userId, modelId } })) === 0) throw new Refusal('not-found')
}

/** Version of the photo of each of a person's models that has one. */
export async function photoVersions(userId: string): Promise<ReadonlyMap<string, string>> {
  const photos = await ModelPhoto.findAll({ where: { userId }, attributes: ['modelId', 'version'] })
  return new Map(photos.map(({ modelId, version }) => [modelId, version]))
}

/** Photos whose model was removed and not put back. */
async function dropForgotten(userId: string, before: Date): Promise<void> {
  const models = await OwnModel.findAll({ where: { userId }, attributes: ['modelId'] })
  const kept = models.map(({ modelId }) => modelId)
  await ModelPhoto.destroy({ where: { userId, savedAt: { [Op.lt]: before }, modelId: { [Op.notIn]: kept } } })
}
