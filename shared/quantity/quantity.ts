import { z } from 'zod'

/** Where a figure comes from, from strongest to weakest. The order is used to say what a verdict rests on. */
export const originKinds = ['standard', 'maker', 'measured', 'common practice', 'class default', 'guess'] as const
export type OriginKind = (typeof originKinds)[number]

/** Below this a figure is a slip of the pen: a share of it would no longer be a number. */
const least = 1e-9
const figure = z
  .number()
  .min(0)
  .max(1e9)
  .refine((value) => value === 0 || value >= least, { message: `too small for a figure: zero, or at least ${least}` })

/**
 * One figure with its origin. The unit stands in the name of the field that holds it (`limit_A`, `length_mm`).
 *
 * `value: null` means unknown: never zero and never good. The sum then takes `high` (or the class's pessimistic end)
 * and every result that rests on it is marked.
 */
export const quantitySchema = z
  .strictObject({
    value: figure.nullable(),
    low: figure.optional(),
    high: figure.optional(),
    origin: z.enum(originKinds),
    /** Id in `catalog/sources.json`. */
    source: z.string().max(60).optional(),
    /** Table, clause or page within the source. */
    clause: z.string().max(120).optional(),
    /** Who measured or stated it. */
    by: z.string().max(120).optional(),
    /** When, as an ISO date. */
    on: z.string().max(30).optional(),
    /** True where nobody has checked the figure against a document yet. */
    fromMemory: z.boolean().optional(),
    note: z.string().max(400).optional(),
  })
  .superRefine((quantity, context) => {
    const { value, low, high } = quantity
    if (low !== undefined && high !== undefined && low > high)
      context.addIssue({ code: 'custom', path: ['low'], message: 'low is above high' })
    if (value !== null && low !== undefined && value < low)
      context.addIssue({ code: 'custom', path: ['value'], message: 'value is below low' })
    if (value !== null && high !== undefined && value > high)
      context.addIssue({ code: 'custom', path: ['value'], message: 'value is above high' })
  })
export type Quantity = z.infer<typeof quantitySchema>
