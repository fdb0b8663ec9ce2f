import { z } from 'zod'

/** GET /api/drives: any part of a serial or WWN, at least three signs of it. */
export const findDrivesQuerySchema = z.strictObject({
  search: z.string().trim().min(3, 'write at least three signs of the serial').max(80),
})
export type FindDrivesQuery = z.infer<typeof findDrivesQuerySchema>

/** Most drives in one answer. */
export const mostFoundDrives = 50

/** A drive in the newest revision of a build of one's own. */
export const foundDriveSchema = z.object({
  buildId: z.string(),
  buildName: z.string(),
  machine: z.string().nullable(),
  partId: z.string(),
  ref: z.string(),
  bay: z.number().nullable(),
  serial: z.string(),
  wwn: z.string(),
  makerModel: z.string(),
})
export type FoundDrive = z.infer<typeof foundDriveSchema>
export const foundDrivesSchema = z.object({ items: z.array(foundDriveSchema), more: z.boolean() })
export type FoundDrives = z.infer<typeof foundDrivesSchema>
