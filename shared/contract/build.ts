import { z } from 'zod'
import { editSchema } from '../build/changes.ts'
import { severitySchema } from '../check/severity.ts'
import { guestSchema } from './guest.ts'
import { reviewStateSchema } from './reviewState.ts'
import { emailSchema, userSchema } from './session.ts'

export const buildRoles = ['owner', 'editor', 'reviewer', 'reader'] as const
export const buildRoleSchema = z.enum(buildRoles)
export type BuildRole = z.infer<typeof buildRoleSchema>

/** What each role may do, for mails and screens. */
export const roleWords: Readonly<Record<BuildRole, string>> = {
  owner: 'you may change everything, invite people and archive the build',
  editor: 'you may change the diagram',
  reviewer: 'you may read everything and give a verdict',
  reader: 'you may read everything',
}

/** A build in the list. `worst` is null where all is within the stated limits. */
export const buildSummarySchema = z.object({
  id: z.string(),
  name: z.string(),
  machine: z.string().nullable(),
  revision: z.number(),
  drives: z.number(),
  parts: z.number(),
  worst: severitySchema.nullable(),
  counts: z.object({ danger: z.number(), fault: z.number(), caution: z.number(), note: z.number() }),
  /** False while a large build's newest revision is still being checked: `worst` and `counts` are then older. */
  checked: z.boolean(),
  changedAt: z.string(),
  changedBy: z.string().nullable(),
  archived: z.boolean(),
  role: buildRoleSchema,
  people: z.array(z.object({ name: z.string(), role: buildRoleSchema })),
  review: reviewStateSchema.default({ approval: null, open: null }),
})
export type BuildSummary = z.infer<typeof buildSummarySchema>

export const buildSorts = ['changed', 'name', 'worst', 'drives'] as const
export const listBuildsQuerySchema = z.strictObject({
  search: z.string().trim().max(120).optional(),
  sort: z.enum(buildSorts).default('changed'),
  archived: z.enum(['no', 'yes']).default('no'),
  page: z.coerce.number().int().min(1).max(100_000).default(1),
  pageSize: z.coerce.number().int().min(1).max(100).default(50),
})
export const buildListSchema = z.object({
  items: z.array(buildSummarySchema),
  total: z.number(),
  page: z.number(),
  pageSize: z.number(),
})
export type BuildList = z.infer<typeof buildListSchema>

/**
 * The opened build: summary and document. Who has no role in it is a `guest` of one of its links. The document is validated by
 * `readBuild`, not here.
 */
export const openBuildSchema = buildSummarySchema.extend({
  role: buildRoleSchema.nullable(),
  guest: guestSchema.nullable().default(null),
  document: z.unknown(),
})

/** POST /api/builds: empty, or from an example. */
export const createBuildRequestSchema = z.strictObject({
  name: z.string().trim().min(1, 'give the build a name').max(120),
  example: z.string().max(60).optional(),
})

/** POST /api/builds/import: any JSON; read by `readBuild`, which names every error by its place. */
export const importBuildRequestSchema = z.strictObject({
  document: z.unknown(),
  name: z.string().trim().min(1).max(120).optional(),
})

/**
 * POST /api/builds/:id/revisions. `base` is the revision the edits start from.
 * `requestId` is made once by the browser: a repeated request (lost answer) gives the first answer again.
 */
export const saveRequestSchema = z.strictObject({
  base: z.int().min(1),
  requestId: z.uuid(),
  edits: z.array(editSchema).min(1).max(500),
})
export type SaveRequest = z.infer<typeof saveRequestSchema>

/**
 * Answer 201. `merged` holds the edits of others that were there since `base`: the browser applies them under its own.
 */
export const saveAnswerSchema = z.object({ revision: z.number(), savedAt: z.string(), merged: z.array(editSchema) })
export type SaveAnswer = z.infer<typeof saveAnswerSchema>

/** Answer 409 (code `conflict`): what changed since `base` on the same parts or joints, to be shown side by side. */
export const saveConflictSchema = z.object({
  code: z.literal('conflict'),
  revision: z.number(),
  /** Edits of others since `base`. */
  theirs: z.array(editSchema),
  /** What both touched, as "parts/p7", "parts/p7/serial", "joints/j3", "refs/W6", "models/x", "accepted/key",
   *  "build/name", "settings": see `shared/build/touch.ts`. Empty where the edits no longer fit for another reason. */
  clashes: z.array(z.string()),
  document: z.unknown(),
})

export const memberSchema = z.object({
  user: userSchema.pick({ id: true, name: true, email: true }),
  role: buildRoleSchema,
})
export type Member = z.infer<typeof memberSchema>
export const invitationSchema = z.object({
  id: z.string(),
  email: z.string(),
  role: buildRoleSchema,
  invitedAt: z.string(),
  expiresAt: z.string(),
})
export type Invitation = z.infer<typeof invitationSchema>
export const membersAnswerSchema = z.object({ members: z.array(memberSchema), invitations: z.array(invitationSchema) })
export const inviteRequestSchema = z.strictObject({
  email: emailSchema,
  role: z.enum(['editor', 'reviewer', 'reader']),
})
export const changeMemberRequestSchema = z.strictObject({ role: buildRoleSchema })
/** What the page behind an invitation link shows before it is accepted. */
export const invitationViewSchema = z.object({
  buildName: z.string(),
  role: buildRoleSchema,
  email: z.string(),
  invitedBy: z.string(),
})
/** What accepting an invitation leads to. */
export const acceptedInvitationSchema = z.object({ buildId: z.string() })
