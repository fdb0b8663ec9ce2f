import { z } from 'zod'
import { catalogIdSchema, localIdSchema } from '../catalog/ids.ts'
import { modelSchema } from '../catalog/model.ts'
import { acceptedFindingSchema, jointSchema, partSchema, purchaseSchema, settingsSchema } from './document.ts'

/** Fields of a part that can be edited one by one; `null` clears an optional one. Id stays. */
export const partPatchSchema = z.strictObject({
  model: partSchema.shape.model.optional(),
  ref: partSchema.shape.ref.optional(),
  name: partSchema.shape.name.nullable(),
  position: partSchema.shape.position.nullable(),
  bay: partSchema.shape.bay.nullable(),
  serial: partSchema.shape.serial.nullable(),
  wwn: partSchema.shape.wwn.nullable(),
  makerModel: partSchema.shape.makerModel.nullable(),
  role: partSchema.shape.role.nullable(),
  mode: partSchema.shape.mode.nullable(),
  routes_mm: partSchema.shape.routes_mm.nullable(),
  pinTest: partSchema.shape.pinTest.nullable(),
  overrides: partSchema.shape.overrides.nullable(),
  note: partSchema.shape.note.nullable(),
})
export type PartPatch = z.infer<typeof partPatchSchema>

/**
 * One edit as data. Canvas, table, form, import and proposals all make these; `apply` is the only place that
 * carries them out, `invert` gives the way back.
 *
 * A user's gesture is a list of changes (`Edit`), undone and saved as one.
 */
export const changeSchema = z.discriminatedUnion('op', [
  z.strictObject({ op: z.literal('addPart'), part: partSchema }),
  /** Refused while joints still hold the part: remove those first in the same edit. */
  z.strictObject({ op: z.literal('removePart'), id: localIdSchema }),
  z.strictObject({ op: z.literal('updatePart'), id: localIdSchema, patch: partPatchSchema }),
  z.strictObject({ op: z.literal('addJoint'), joint: jointSchema }),
  z.strictObject({ op: z.literal('removeJoint'), id: localIdSchema }),
  z.strictObject({ op: z.literal('putModel'), model: modelSchema }),
  z.strictObject({ op: z.literal('removeModel'), id: catalogIdSchema }),
  z.strictObject({ op: z.literal('acceptFinding'), accepted: acceptedFindingSchema }),
  z.strictObject({ op: z.literal('withdrawAcceptance'), key: z.string().min(1).max(300) }),
  z.strictObject({ op: z.literal('updateSettings'), settings: settingsSchema }),
  /** Notes about buying one line of the parts list, as a whole; `null` clears them. */
  z.strictObject({
    op: z.literal('setPurchase'),
    line: purchaseSchema.shape.line,
    purchase: purchaseSchema.omit({ line: true }).nullable(),
  }),
  z.strictObject({
    op: z.literal('rename'),
    name: z.string().min(1).max(120),
    machine: z.string().max(60).nullable().optional(),
  }),
])
export type Change = z.infer<typeof changeSchema>

export const editSchema = z.strictObject({
  changes: z.array(changeSchema).min(1).max(40_000),
  /** Words for undo and history, as "Connect W2 to bays 5 to 8". */
  label: z.string().min(1).max(200),
})
export type Edit = z.infer<typeof editSchema>
