import type { z } from 'zod'
import {
  askedRoundSchema,
  reviewRulesSchema,
  roundSchema,
  roundsAnswerSchema,
  type AskRoundRequest,
  type GiveVerdictRequest,
  type ReviewRules,
  type Round,
} from '#shared/contract/rounds.ts'
import { request, step } from './client.ts'

export type Rounds = z.infer<typeof roundsAnswerSchema>
export type AskedRound = z.infer<typeof askedRoundSchema>

const path = (buildId: string, rest = ''): string => `/api/builds/${step(buildId)}/rounds${rest}`

export const listRounds = (buildId: string, signal?: AbortSignal): Promise<Rounds> =>
  request(roundsAnswerSchema, 'GET', path(buildId), { signal })

export const askRound = (buildId: string, wanted: AskRoundRequest): Promise<AskedRound> =>
  request(askedRoundSchema, 'POST', path(buildId), { body: wanted })

export const giveVerdict = (buildId: string, roundId: string, verdict: GiveVerdictRequest): Promise<Round> =>
  request(roundSchema, 'PUT', path(buildId, `/${step(roundId)}/verdict`), { body: verdict })

export const endRound = (buildId: string, roundId: string, as: 'closed' | 'withdrawn'): Promise<Round> =>
  request(roundSchema, 'POST', path(buildId, `/${step(roundId)}/end`), { body: { as } })

export const setRules = (buildId: string, rules: ReviewRules): Promise<ReviewRules> =>
  request(reviewRulesSchema, 'PUT', `/api/builds/${step(buildId)}/review-rules`, { body: rules })
