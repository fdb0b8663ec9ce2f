import { z } from 'zod'

/** The newest approval of a build, with its revision, and whether the diagram has moved on since. */
export const approvalSchema = z.object({
  round: z.number(),
  revision: z.number(),
  by: z.array(z.object({ name: z.string(), guest: z.boolean() })),
  at: z.string(),
  lapsedRevision: z.number().nullable(),
})
export type Approval = z.infer<typeof approvalSchema>

/** How a build stands with its reviewers, for lists, bars and papers. */
export const reviewStateSchema = z.object({
  approval: approvalSchema.nullable(),
  /** The round that is under way. */
  open: z.object({ round: z.number(), revision: z.number(), changesAsked: z.boolean() }).nullable(),
})
export type ReviewState = z.infer<typeof reviewStateSchema>
