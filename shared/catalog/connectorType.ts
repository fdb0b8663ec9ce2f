import { z } from 'zod'
import { quantitySchema } from '../quantity/quantity.ts'
import { catalogIdSchema } from './ids.ts'

const contactCountSchema = z.int().min(0).max(64)

/** How many contacts carry each rail and the shared return. */
export const contactsSchema = z.strictObject({
  '12V': contactCountSchema.optional(),
  '5V': contactCountSchema.optional(),
  '3.3V': contactCountSchema.optional(),
  return: contactCountSchema.optional(),
})
export type Contacts = z.infer<typeof contactsSchema>

/** Plug and receptacle as the connector's own standard tells them apart; slot and edge for add-in cards. */
export const connectorSides = ['plug', 'receptacle', 'slot', 'edge'] as const

/**
 * A kind of connector: what it carries, what its contacts may carry, and what it mates with.
 * Mating is symmetric: `catalog/index.ts` refuses a catalog in which A names B but B does not name A.
 */
export const connectorTypeSchema = z.strictObject({
  id: catalogIdSchema,
  name: z.string().min(1).max(120),
  /** Standard or document that defines it, as "SFF-8482". */
  standard: z.string().max(120),
  side: z.enum(connectorSides),
  placement: z.enum(['internal', 'external']).default('internal'),
  /** Element code of the SCSI Enclosure Services standard, where it has one. */
  sesCode: z.string().max(10).optional(),
  power: z
    .strictObject({
      contacts: contactsSchema,
      /** Sustained current for one contact. */
      rating_A: quantitySchema,
      /** Where the rating depends on the wire in the contact: rating by AWG, thickest first. */
      ratingByWire: z
        .array(z.strictObject({ awg: z.int().min(0).max(40), rating_A: quantitySchema }))
        .max(20)
        .optional(),
      contactResistance_mohm: z.strictObject({ initial: quantitySchema, endOfLife: quantitySchema }),
      /** True where contact 3 can tell a drive to stay off (15-contact SATA power segment and its SAS kin). */
      hasPowerDisableContact: z.boolean().default(false),
    })
    .optional(),
  data: z
    .strictObject({
      lanes: z.int().min(1).max(16),
      sideband: z.boolean().default(false),
      /** Where some types go in whose lanes stand on other contacts: the types with which lanes meet. */
      linksOnlyWith: z.array(catalogIdSchema).max(40).optional(),
    })
    .optional(),
  matesWith: z.array(catalogIdSchema).max(40),
  keying: z.string().max(400).optional(),
  note: z.string().max(400).optional(),
  sources: z.array(z.string().max(60)).max(10).default([]),
})
export type ConnectorType = z.infer<typeof connectorTypeSchema>
