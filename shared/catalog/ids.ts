import { z } from 'zod'

/** Catalog ids are file names: lower case, digits, dots and hyphens. */
export const catalogIdSchema = z
  .string()
  .min(1)
  .max(60)
  .regex(/^[a-z0-9]+(?:[.-][a-z0-9]+)*$/, 'use lower-case letters, digits, dots and hyphens')

/** Ids of parts, joints and connectors inside a document. */
export const localIdSchema = z
  .string()
  .min(1)
  .max(60)
  .regex(/^[A-Za-z0-9](?:[A-Za-z0-9._-]*[A-Za-z0-9])?$/, 'use letters, digits, dots, hyphens and underscores')
