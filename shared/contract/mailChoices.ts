import { z } from 'zod'

/** Kinds of mail that a person may choose about. Links for new passwords come only when asked for and are no choice. */
export const mailKinds = ['review-asked', 'verdict', 'mention', 'reply', 'comment', 'invitation', 'digest'] as const
export const mailKindSchema = z.enum(mailKinds)
export type MailKind = z.infer<typeof mailKindSchema>

/** When mails of a kind come. `daily` and `weekly` are for the digest itself. */
export const mailTimings = ['at-once', 'digest', 'daily', 'weekly', 'never'] as const
export const mailTimingSchema = z.enum(mailTimings)
export type MailTiming = z.infer<typeof mailTimingSchema>

const personal = { timings: ['at-once', 'digest', 'never'] } as const
/** What may be chosen for each kind, what holds until then, and its words: "... when somebody mentions you". */
export const mailKindFacts: Readonly<
  Record<MailKind, { timings: readonly MailTiming[]; usual: MailTiming; words: string; off: string }>
> = {
  'review-asked': { ...personal, usual: 'at-once', words: 'You are asked for a review', off: 'requests for a review' },
  verdict: {
    ...personal,
    usual: 'at-once',
    words: 'A verdict on a review, or an approval that lapses',
    off: 'verdicts',
  },
  mention: { ...personal, usual: 'at-once', words: 'Somebody mentions you', off: 'mentions' },
  reply: { ...personal, usual: 'at-once', words: 'Somebody answers where you wrote', off: 'replies' },
  comment: { ...personal, usual: 'digest', words: 'Any other comment on a build you own', off: 'comments' },
  invitation: {
    timings: ['at-once', 'never'],
    usual: 'at-once',
    words: 'Somebody invites you to a build',
    off: 'invitations',
  },
  digest: {
    timings: ['daily', 'weekly', 'never'],
    usual: 'weekly',
    words: 'A digest of what others did in your builds',
    off: 'the digest',
  },
}

/** What a timing is called on screen. */
export const mailTimingWords: Readonly<Record<MailTiming, string>> = {
  'at-once': 'at once',
  digest: 'in the digest',
  daily: 'every day',
  weekly: 'every week',
  never: 'never',
}

const choices = z.record(mailKindSchema, mailTimingSchema)
/** GET /api/account/mail-choices */
export const mailChoicesSchema = choices
export type MailChoices = z.infer<typeof mailChoicesSchema>
/** PUT /api/account/mail-choices: one kind at a time, with a timing that it knows. */
export const putMailChoiceRequestSchema = z
  .strictObject({ kind: mailKindSchema, timing: mailTimingSchema })
  .refine(({ kind, timing }) => mailKindFacts[kind].timings.includes(timing), {
    path: ['timing'],
    message: 'this kind of mail does not come like that',
  })
export type MailChoice = z.infer<typeof putMailChoiceRequestSchema>

/** What the page behind an unsubscribe link shows, and what the link answers. */
export const subscriptionSchema = z.object({ kind: mailKindSchema, timing: mailTimingSchema })
export type Subscription = z.infer<typeof subscriptionSchema>
