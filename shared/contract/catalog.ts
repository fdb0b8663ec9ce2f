import { z } from 'zod'
import { modelSchema } from '../catalog/model.ts'
import { catalogSchema } from '../catalog/catalog.ts'

/** GET /api/catalog, with an ETag: the shared catalog, shipped and edited models together. */
export const catalogAnswerSchema = catalogSchema

/** PUT /api/catalog/models/:id (catalog editor). Shipped models can be corrected; the shipped file stays as it is. */
export const putModelRequestSchema = z.strictObject({ model: modelSchema, note: z.string().max(300).optional() })

/** A model in a person's own library, for use in any of their builds. */
export const ownModelSchema = z.object({
  id: z.string(),
  model: modelSchema,
  changedAt: z.string(),
  /** Version of the photo of its label, where there is one. */
  photo: z.string().optional(),
})
export type OwnModel = z.infer<typeof ownModelSchema>
export const photoVersionSchema = z.object({ version: z.string() })
export const putOwnModelRequestSchema = z.strictObject({ model: modelSchema })

export const exampleSchema = z.object({ id: z.string(), name: z.string(), summary: z.string(), drives: z.number() })
export type Example = z.infer<typeof exampleSchema>
