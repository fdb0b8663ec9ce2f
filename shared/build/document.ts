import { z } from 'zod'
import { localIdSchema, catalogIdSchema } from '../catalog/ids.ts'
import { modelSchema, spinUpMeansSchema } from '../catalog/model.ts'
import { quantitySchema } from '../quantity/quantity.ts'

export const documentFormat = 'bayloom-build'
export const documentVersion = 1

/** Bounds that keep any accepted document within what the checker handles without a pause. */
export const documentLimits = { parts: 12_000, joints: 24_000, models: 500, accepted: 2_000, purchases: 2_000 } as const

export const toleranceStandards = ['atx', 'atx3', 'server'] as const

export const settingsSchema = z.strictObject({
  /** Table by which supply and device voltages are judged where neither states its own. */
  tolerance: z.enum(toleranceStandards).default('atx'),
  wireTemperature_C: z.number().min(-20).max(105).default(40),
  /** Share of a limit above which a caution is given. */
  derating: z.number().min(0.3).max(1).default(0.8),
  /** Seconds of start current may exceed a contact's sustained rating by this factor. Common practice. */
  shortTimeAllowance: z.number().min(1).max(3).default(1.25),
  /** Share of the single-wire ampacity left to a wire in a bundle or sleeve. Common practice. */
  bundleFactor: z.number().min(0.2).max(1).default(0.7),
  spinUp: z
    .strictObject({
      mode: z.enum(['together', 'staged']).default('together'),
      by: spinUpMeansSchema.default('controller'),
      groupSize: z.int().min(1).max(400).default(2),
      interval_s: z.number().min(0.1).max(600).default(12),
    })
    .prefault({}),
  array: z
    .strictObject({
      needsPassThrough: z.boolean().default(true),
      parityDrives: z.int().min(0).max(20).default(1),
    })
    .prefault({}),
  /** Mains voltage decides which efficiency and current figures are shown at the wall. */
  mains_V: z.union([z.literal(115), z.literal(230)]).default(230),
})
export type Settings = z.infer<typeof settingsSchema>

export const roles = ['data', 'parity', 'cache', 'boot', 'spare'] as const
export type Role = (typeof roles)[number]

/** Reference designation: a class letter of IEC 81346-2 and a number, as "W6". Given once, never renumbered. */
export const refSchema = z
  .string()
  .max(12)
  .regex(/^[A-Z]{1,2}[1-9][0-9]{0,5}$/, 'use a class letter and a number, as "W6"')

const coordinateSchema = z.number().min(-1e6).max(1e6)

export const partSchema = z.strictObject({
  id: localIdSchema,
  model: catalogIdSchema,
  ref: refSchema,
  name: z.string().max(120).optional(),
  position: z.strictObject({ x: coordinateSchema, y: coordinateSchema }).optional(),
  /** Drives: the bay that holds it. Backplanes: the first bay that it serves. */
  bay: z.strictObject({ case: localIdSchema, slot: z.int().min(1).max(400) }).optional(),
  serial: z.string().max(80).optional(),
  /** World wide name of a drive, as the operating system shows it without "0x". */
  wwn: z
    .string()
    .regex(/^[0-9a-f]{16,32}$/, 'use 16 to 32 hex digits in lower case, without "0x"')
    .optional(),
  /** What its maker calls it, as printed on the label or told by the drive. */
  makerModel: z.string().min(1).max(80).optional(),
  role: z.enum(roles).optional(),
  /** Controllers that can do both: how this one is set. */
  mode: z.enum(['pass-through', 'combined']).optional(),
  /** Route in the case from the cable's first connector to the named one, where somebody measured it. */
  routes_mm: z.record(localIdSchema, z.number().min(0).max(100_000)).optional(),
  /** A modular lead proven on a supply by measuring every pin. Void when either is changed. */
  pinTest: z
    .strictObject({
      supply: localIdSchema,
      supplyModel: catalogIdSchema,
      by: z.string().min(1).max(120),
      on: z.string().min(1).max(30),
    })
    .optional(),
  /** This part's own figures by path into its model, as "load.12V.start.peak_A" or "supply.rails.12V1.limit_A". */
  overrides: z.record(z.string().min(1).max(120), quantitySchema).optional(),
  note: z.string().max(2000).optional(),
})
export type Part = z.infer<typeof partSchema>

export const jointEndSchema = z.strictObject({ part: localIdSchema, connector: localIdSchema })
export type JointEnd = z.infer<typeof jointEndSchema>

/** Two connectors mated. A joint has no length: wire and resistance live in the parts. */
export const jointSchema = z.strictObject({ id: localIdSchema, a: jointEndSchema, b: jointEndSchema })
export type Joint = z.infer<typeof jointSchema>

/** A finding that a person accepts. It comes back when `load` passes what was accepted. */
export const acceptedFindingSchema = z.strictObject({
  key: z.string().min(1).max(300),
  reason: z.string().min(1).max(1000),
  by: z.string().max(120),
  on: z.string().max(30),
  severity: z.enum(['danger', 'fault', 'caution', 'note']),
  load: z.number().optional(),
})
export type AcceptedFinding = z.infer<typeof acceptedFindingSchema>

/** What a person noted about buying one line of the parts list. Absent figures are not known, never zero. */
export const purchaseSchema = z.strictObject({
  /** Line of the parts list: model, and length where it differs from the model's. */
  line: z.string().min(1).max(160),
  owned: z.int().min(0).max(100_000).optional(),
  ordered: z.int().min(0).max(100_000).optional(),
  note: z.string().min(1).max(300).optional(),
  /** For one piece. */
  price: z.number().min(0).max(10_000_000).optional(),
  currency: z
    .string()
    .regex(/^[A-Z]{3}$/, 'three capital letters, as "EUR"')
    .optional(),
})
export type Purchase = z.infer<typeof purchaseSchema>

const uniqueBy = (items: readonly Record<string, unknown>[], field: string, list: string, context: z.RefinementCtx) => {
  const seen = new Map<unknown, number>()
  items.forEach((item, i) => {
    const first = seen.get(item[field])
    if (first !== undefined)
      context.addIssue({
        code: 'custom',
        path: [list, i, field],
        message: `"${String(item[field])}" is already used by ${list}[${first}]`,
      })
    else seen.set(item[field], i)
  })
}

/** The build document: one JSON object that is the diagram. Unknown fields are refused with their path. */
export const buildDocumentSchema = z
  .strictObject({
    format: z.literal(documentFormat),
    version: z.literal(documentVersion),
    name: z.string().min(1).max(120),
    /** Identity written on the machine, as "RV-N-01". */
    machine: z.string().max(60).optional(),
    settings: settingsSchema.prefault({}),
    /** Own models of this build. They win over catalog models of the same id. */
    models: z.array(modelSchema).max(documentLimits.models).default([]),
    parts: z.array(partSchema).max(documentLimits.parts),
    joints: z.array(jointSchema).max(documentLimits.joints),
    accepted: z.array(acceptedFindingSchema).max(documentLimits.accepted).default([]),
    /** Absent while nobody noted anything, so that documents from before there was a parts list stay what they were. */
    purchases: z.array(purchaseSchema).min(1).max(documentLimits.purchases).optional(),
  })
  .superRefine((document, context) => {
    uniqueBy(document.parts, 'id', 'parts', context)
    uniqueBy(document.parts, 'ref', 'parts', context)
    uniqueBy(document.joints, 'id', 'joints', context)
    uniqueBy(document.models, 'id', 'models', context)
    uniqueBy(document.purchases ?? [], 'line', 'purchases', context)
  })
export type BuildDocument = z.infer<typeof buildDocumentSchema>
export type BuildDocumentInput = z.input<typeof buildDocumentSchema>
