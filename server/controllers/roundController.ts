import type { z } from 'zod'
import type {
  AskRoundRequest,
  endRoundRequestSchema,
  GiveVerdictRequest,
  ReviewRules,
} from '#shared/contract/rounds.ts'
import { created, ok, type Answer, type Call } from '../middleware/call.ts'
import { askRound } from '../services/askRound.ts'
import { Refusal } from '../services/refusal.ts'
import { listRounds, readRules, setRules } from '../services/roundList.ts'
import { endRound, giveVerdict } from '../services/roundService.ts'
import { reviewerOf } from './reviewerOf.ts'
import { userOf } from './signedIn.ts'

type OfRound<Body = unknown> = Call<{ buildId: string; roundId: string }, unknown, Body>

function memberOf(call: Pick<Call, 'buildRole' | 'signedIn'>) {
  if (!call.buildRole) throw new Refusal('not-found')
  return { userId: userOf(call).id, role: call.buildRole }
}

export async function readRounds(call: Call<{ buildId: string }>): Promise<Answer> {
  const { context, params } = call
  const [rules, rounds] = await Promise.all([
    readRules(context, params.buildId),
    listRounds(context, params.buildId, reviewerOf(call)),
  ])
  return ok({ rules, rounds })
}

export async function postRound(call: Call<{ buildId: string }, unknown, AskRoundRequest>): Promise<Answer> {
  const asker = { user: userOf(call), role: memberOf(call).role }
  return created(await askRound(call.context, asker, call.params.buildId, call.body))
}

export async function putVerdict(call: OfRound<GiveVerdictRequest>): Promise<Answer> {
  const { context, params, body } = call
  return ok(await giveVerdict(context, reviewerOf(call), params.buildId, params.roundId, body))
}

export async function postRoundEnd(call: OfRound<z.output<typeof endRoundRequestSchema>>): Promise<Answer> {
  const { context, params, body } = call
  return ok(await endRound(context, memberOf(call), params.buildId, params.roundId, body.as))
}

export async function putRules(call: Call<{ buildId: string }, unknown, ReviewRules>): Promise<Answer> {
  return ok(await setRules(call.context, call.params.buildId, call.body))
}
