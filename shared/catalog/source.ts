import { z } from 'zod'

/** A published document that figures are read from. Cite the document, not the mirror. */
export const sourceSchema = z.strictObject({
  id: z.string().min(1).max(60),
  title: z.string().min(1).max(300),
  /** Table, clause or page, where one source is one place. */
  clause: z.string().max(200).optional(),
  publisher: z.string().max(120).optional(),
  year: z.int().min(1900).max(2100).optional(),
  /** How sure: read in the cited text, second-hand, or weak. */
  sureness: z.enum(['read', 'second-hand', 'weak']),
  note: z.string().max(400).optional(),
})
export type Source = z.infer<typeof sourceSchema>
