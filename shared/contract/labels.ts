import { z } from 'zod'
import { labelForms } from '../paper/labels/forms.ts'
import { labelGroups } from '../paper/labels/label.ts'
import { labelSheetSchema, sheetProblems } from '../paper/labels/sheet.ts'

const revisionNumber = z
  .int()
  .min(1)
  .max(2 ** 31 - 1)

/** POST /api/builds/:buildId/labels: labels of a revision (absent: the newest) on sheets, as a PDF. */
export const labelsRequestSchema = z.strictObject({
  revision: revisionNumber.optional(),
  /** Only the labels that say something else than in this revision. */
  since: revisionNumber.optional(),
  groups: z.array(z.enum(labelGroups)).min(1).max(labelGroups.length),
  freeEnds: z.boolean().default(true),
  sheet: labelSheetSchema.superRefine((sheet, context) => {
    for (const message of sheetProblems(sheet)) context.addIssue({ code: 'custom', message })
  }),
  form: z.enum(labelForms).default('wrap'),
  diameter_mm: z.number().min(1).max(30).default(6.5),
  /** First free label of the first sheet, from 0. */
  start: z.int().min(0).max(1800).default(0),
  offsetX_mm: z.number().min(-20).max(20).default(0),
  offsetY_mm: z.number().min(-20).max(20).default(0),
  /** Draws the edges of the labels, for a trial on plain paper. */
  edges: z.boolean().default(false),
})
export type LabelsRequest = z.infer<typeof labelsRequestSchema>
