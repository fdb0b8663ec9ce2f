import type { Analysis } from '../check/check.ts'
import type { CheckResult } from '../check/result.ts'

/** The questions that a reviewer asks first, in the order in which they are asked. */
export const questionIds = ['supply', 'power', 'drives', 'controllers', 'cables', 'figures', 'findings'] as const
export type QuestionId = (typeof questionIds)[number]

/** One line of an answer: what it is about, what is so, and whether a reviewer should look twice. */
export interface AnswerLine {
  subject: string
  words: string
  look: boolean
  /** Parts to light up. */
  parts: readonly string[]
}

/** A question answered from the plan. */
export interface Answer {
  id: QuestionId
  question: string
  /** The answer in a sentence. */
  short: string
  lines: readonly AnswerLine[]
}

/** What an answer is made from. */
export interface AnswerInput {
  analysis: Analysis
  result: CheckResult
}

/** How many lines ask to be looked at twice. */
export const looks = ({ lines }: Answer): number => lines.filter(({ look }) => look).length
