import { z } from 'zod'
import { toldChangeSchema } from '../build/compareTold.ts'
import { resultComparisonSchema } from '../check/compareResults.ts'

/** One saved state of a build, as the history lists it. */
export const revisionSchema = z.object({
  revision: z.number(),
  savedAt: z.string(),
  /** Null where the account is gone: a former member. */
  savedBy: z.string().nullable(),
  /** What was done, in the words of the edits. */
  label: z.string(),
  hash: z.string(),
  /** Given by people: a name to find it by, and what is to be said about it. */
  name: z.string().nullable(),
  note: z.string().nullable(),
  /** The revision that it brought back. */
  restored: z.number().nullable(),
})
export type Revision = z.infer<typeof revisionSchema>

/** Revisions on one page of the history. */
export const revisionsPageSize = 50

const revisionNumberSchema = z.coerce
  .number()
  .int()
  .min(1)
  .max(2 ** 31 - 1)

/** GET /api/builds/:id/revisions: the newest ones, or those older than `before`. */
export const listRevisionsQuerySchema = z.strictObject({
  before: revisionNumberSchema.optional(),
  named: z.enum(['yes', 'no']).default('no'),
})
export type ListRevisionsQuery = z.infer<typeof listRevisionsQuerySchema>

/** GET /api/builds/:id/revisions/:revision */
export const openRevisionSchema = z.object({ revision: revisionSchema, document: z.unknown() })

const named = z
  .string()
  .trim()
  .max(80)
  .transform((text) => text || null)
const noted = z
  .string()
  .trim()
  .max(2000)
  .transform((text) => text || null)

/** PATCH /api/builds/:id/revisions/:revision: an empty text takes the name or the note away. */
export const describeRevisionRequestSchema = z.strictObject({
  name: named.nullable().optional(),
  note: noted.nullable().optional(),
})
export type DescribeRevisionRequest = z.infer<typeof describeRevisionRequestSchema>

/** POST /api/builds/:id/revisions/:revision/restore. `base` is the newest revision that the person has seen. */
export const restoreRevisionRequestSchema = z.strictObject({ base: z.int().min(1), requestId: z.uuid() })
export type RestoreRevisionRequest = z.infer<typeof restoreRevisionRequestSchema>

/** GET /api/builds/:id/comparison. Without `to`: the newest revision. */
export const comparisonQuerySchema = z.strictObject({ from: revisionNumberSchema, to: revisionNumberSchema.optional() })
export type ComparisonQuery = z.infer<typeof comparisonQuerySchema>

/** Changes and margins that a comparison carries; what is beyond is counted. */
export const comparisonLimits = { changes: 2_000, margins: 200 } as const

/** Two revisions of one build side by side, read by meaning. */
export const comparisonSchema = z.object({
  from: revisionSchema,
  to: revisionSchema,
  changes: z.array(toldChangeSchema),
  moreChanges: z.number(),
  /** Null where the checker broke off on one of them. */
  results: resultComparisonSchema.extend({ moreMargins: z.number() }).nullable(),
})
export type Comparison = z.infer<typeof comparisonSchema>
