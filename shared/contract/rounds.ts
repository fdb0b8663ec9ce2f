import { z } from 'zod'
import { authorSchema } from './activity.ts'
import { passPhraseSchema, longestLink_days } from './buildLinks.ts'
import { emailSchema } from './session.ts'

export const verdictKinds = ['approve', 'ask-for-changes'] as const
export const verdictKindSchema = z.enum(verdictKinds)
export type VerdictKind = z.infer<typeof verdictKindSchema>

/** Which open findings hold an approval back. */
export const findingBars = ['none', 'danger', 'fault'] as const

/** What an approval needs, as the owners of a build set it. A round keeps the rules that stood when it was asked. */
export const reviewRulesSchema = z.strictObject({
  approvals: z.int().min(1, 'at least one').max(9, 'at most nine'),
  /** `danger`: no open danger; `fault`: no open danger and no open fault. */
  heldBackBy: z.enum(findingBars),
  /** Whether the approval of a guest counts. */
  guestsCount: z.boolean(),
})
export type ReviewRules = z.infer<typeof reviewRulesSchema>

/** POST /api/builds/:buildId/rounds. Members by id, others by mail, anybody by a link: at least one of them. */
export const askRoundRequestSchema = z
  .strictObject({
    /** The revision that is looked at; the newest where none is given. */
    revision: z.int().min(1).optional(),
    question: z.string().trim().max(2000).default(''),
    reviewers: z.array(z.uuid()).max(50).default([]),
    invite: z.array(emailSchema).max(20).default([]),
    link: z
      .strictObject({
        days: z.int().min(1, 'at least one day').max(longestLink_days, 'at most a year'),
        passPhrase: passPhraseSchema.optional(),
      })
      .optional(),
  })
  .refine(({ reviewers, invite, link }) => reviewers.length + invite.length > 0 || link !== undefined, {
    message: 'name somebody, or make a link',
    path: ['reviewers'],
  })
export type AskRoundRequest = z.infer<typeof askRoundRequestSchema>

/** PUT /api/builds/:buildId/rounds/:roundId/verdict; a second one takes the place of the first. */
export const giveVerdictRequestSchema = z
  .strictObject({ verdict: verdictKindSchema, summary: z.string().trim().max(4000).default('') })
  .refine(({ verdict, summary }) => verdict === 'approve' || summary !== '', {
    message: 'say what should change',
    path: ['summary'],
  })
export type GiveVerdictRequest = z.infer<typeof giveVerdictRequestSchema>

/** POST /api/builds/:buildId/rounds/:roundId/end. A withdrawn round counts for nothing; a closed one keeps its outcome. */
export const endRoundRequestSchema = z.strictObject({ as: z.enum(['closed', 'withdrawn']) })

export const verdictSchema = z.object({
  by: authorSchema,
  verdict: verdictKindSchema,
  summary: z.string(),
  givenAt: z.string(),
  /** The caller's own. */
  mine: z.boolean(),
})
export type Verdict = z.infer<typeof verdictSchema>

/** Somebody asked by name. Guests are not shown addresses: `name` is null then for who has not come yet. */
export const askedSchema = z.object({
  userId: z.string().nullable(),
  name: z.string().nullable(),
  email: z.string().nullable(),
})
export type Asked = z.infer<typeof askedSchema>

/** Where a round stands. `held back`: enough approvals, but a rule forbids it. */
export const roundStandings = ['waiting', 'changes asked', 'held back', 'approved', 'lapsed', 'withdrawn'] as const

export const roundSchema = z.object({
  id: z.string(),
  number: z.number(),
  /** The revision that the reviewers look at. */
  revision: z.number(),
  /** Revision of the round before, for what changed since; null in the first. */
  previousRevision: z.number().nullable(),
  question: z.string(),
  state: z.enum(['open', 'closed', 'withdrawn']),
  standing: z.enum(roundStandings),
  askedBy: authorSchema,
  askedAt: z.string(),
  endedAt: z.string().nullable(),
  asked: z.array(askedSchema),
  byLink: z.boolean(),
  rules: reviewRulesSchema,
  /** Open dangers and faults at that revision when it was asked; null where the checker broke off. */
  stops: z.object({ danger: z.number(), fault: z.number() }).nullable(),
  verdicts: z.array(verdictSchema),
  /** The first revision that took an approval away. */
  lapsedRevision: z.number().nullable(),
  /** Whether the caller may give a verdict now. */
  mayJudge: z.boolean(),
})
export type Round = z.infer<typeof roundSchema>

/** GET /api/builds/:buildId/rounds: newest first. */
export const roundsAnswerSchema = z.object({ rules: reviewRulesSchema, rounds: z.array(roundSchema) })
/** Answer 201. `token`: of the link that was made with it, shown this once. */
export const askedRoundSchema = z.object({ round: roundSchema, token: z.string().nullable() })
