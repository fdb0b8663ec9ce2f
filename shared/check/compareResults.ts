import { z } from 'zod'
import { findingSchema, ledgerKinds, momentIdSchema, subjectSchema, type CheckResult, type Finding } from './result.ts'
import { compareMargins } from './compareMargins.ts'
import { severityRank, severitySchema } from './severity.ts'

/** A finding as far as a comparison shows it. */
export const comparedFindingSchema = findingSchema
  .pick({ key: true, rule: true, severity: true, message: true, remedy: true, about: true, subjects: true })
  .extend({ accepted: z.boolean() })
export type ComparedFinding = z.infer<typeof comparedFindingSchema>

/** One row of the ledger at its worst moment. */
export const worstOfRowSchema = z.object({
  moment: momentIdSchema,
  load: z.number(),
  limit: z.number(),
  margin: z.number(),
  about: z.boolean(),
})
export type WorstOfRow = z.infer<typeof worstOfRowSchema>

/** What is left of a limit before and after; null on the side where the row is not there. */
export const marginChangeSchema = z.object({
  kind: z.enum(ledgerKinds),
  name: z.string(),
  unit: z.enum(['A', 'W', 'V']),
  subject: subjectSchema,
  before: worstOfRowSchema.nullable(),
  after: worstOfRowSchema.nullable(),
})
export type MarginChange = z.infer<typeof marginChangeSchema>

const verdictSchema = z.object({
  worst: severitySchema.nullable(),
  counts: z.object({
    danger: z.number(),
    fault: z.number(),
    caution: z.number(),
    note: z.number(),
    accepted: z.number(),
  }),
  weakestHop: z.string().nullable(),
})

export const resultComparisonSchema = z.object({
  before: verdictSchema,
  after: verdictSchema,
  /** Not there before, or accepted before and open now. */
  gained: z.array(comparedFindingSchema),
  /** Gone, or open before and accepted now. */
  lost: z.array(comparedFindingSchema),
  /** Still there, and worse or milder. */
  shifted: z.array(z.object({ before: comparedFindingSchema, after: comparedFindingSchema })),
  /** Least left first. */
  margins: z.array(marginChangeSchema),
})
export type ResultComparison = z.infer<typeof resultComparisonSchema>

/** What the checker says of two states of one build, side by side: findings gained and lost, and what is left of each limit. */
export function compareResults(before: CheckResult, after: CheckResult): ResultComparison {
  const [old, now] = [byKey(before.findings), byKey(after.findings)]
  const shifted: ResultComparison['shifted'] = []
  for (const [key, finding] of now) {
    const was = old.get(key)
    if (
      was &&
      !was.accepted &&
      !finding.accepted &&
      (was.severity !== finding.severity || was.message !== finding.message)
    )
      shifted.push({ before: shown(was), after: shown(finding) })
  }
  return {
    before: verdictOf(before),
    after: verdictOf(after),
    gained: [...now.values()]
      .filter((one) => !one.accepted && isQuiet(old.get(one.key)))
      .sort(worstFirst)
      .map(shown),
    lost: [...old.values()]
      .filter((one) => !one.accepted && isQuiet(now.get(one.key)))
      .sort(worstFirst)
      .map((one) => ({ ...shown(one), accepted: now.get(one.key)?.accepted !== undefined })),
    shifted,
    margins: compareMargins(before.ledger, after.ledger),
  }
}

const byKey = (findings: readonly Finding[]) => new Map(findings.map((finding) => [finding.key, finding]))

/** Says nothing: not there, or accepted. */
const isQuiet = (finding: Finding | undefined): boolean => finding === undefined || finding.accepted !== undefined

const worstFirst = (a: Finding, b: Finding): number => severityRank[a.severity] - severityRank[b.severity]

const shown = ({ key, rule, severity, message, remedy, about, subjects, accepted }: Finding): ComparedFinding => ({
  key,
  rule,
  severity,
  message,
  remedy,
  about,
  subjects,
  accepted: accepted !== undefined,
})

const verdictOf = ({ worst, counts, weakestHop }: CheckResult) => ({ worst, counts, weakestHop })
