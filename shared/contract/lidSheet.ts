import { z } from 'zod'
import { paperNames, viewNames } from '../paper/lid/content.ts'
import { diagramChoices } from '../paper/lid/pages.ts'

/** An address that a code may open: a page, never a script. */
export const codeAddressSchema = z.url({ protocol: /^https?$/ }).max(400)

/** POST /api/builds/:buildId/lid-sheet: the page for the inside of the lid, of a revision (absent: the newest), as a PDF. */
export const lidSheetRequestSchema = z.strictObject({
  revision: z
    .int()
    .min(1)
    .max(2 ** 31 - 1)
    .optional(),
  paper: z.enum(paperNames).default('a4'),
  colour: z.boolean().default(false),
  diagram: z.enum(diagramChoices).default('auto'),
  /** Absent: as the case states. */
  seenFrom: z.enum(viewNames).optional(),
  contact: z.string().max(300).default(''),
  /** What the code opens; empty: no code. */
  address: z.union([z.literal(''), codeAddressSchema]).default(''),
  /** The day that is printed, in the reader's own time zone. */
  date: z.iso.date(),
})
export type LidSheetRequest = z.infer<typeof lidSheetRequestSchema>
