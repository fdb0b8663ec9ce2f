import {
  askedRoundSchema,
  askRoundRequestSchema,
  endRoundRequestSchema,
  giveVerdictRequestSchema,
  reviewRulesSchema,
  roundsAnswerSchema,
  roundSchema,
} from '#shared/contract/rounds.ts'
import { postRound, postRoundEnd, putRules, putVerdict, readRounds } from '../controllers/roundController.ts'
import { buildParams, roundParams } from './params.ts'
import { defineRoute } from './route.ts'

export const roundRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/builds/:buildId/rounds',
    policy: 'see-build',
    summary: 'Rounds of review with their verdicts, newest first, and what an approval needs',
    params: buildParams,
    answers: { 200: roundsAnswerSchema },
    controller: readRounds,
  }),
  defineRoute({
    method: 'post',
    path: '/api/builds/:buildId/rounds',
    policy: 'edit-build',
    summary: 'Ask for review of one revision; only owners invite people and make a link with it',
    params: buildParams,
    body: askRoundRequestSchema,
    rateLimit: 'invite',
    answers: { 201: askedRoundSchema },
    controller: postRound,
  }),
  defineRoute({
    method: 'put',
    path: '/api/builds/:buildId/rounds/:roundId/verdict',
    policy: 'comment-on-build',
    summary: 'Give one’s verdict in an open round, or change it',
    params: roundParams,
    body: giveVerdictRequestSchema,
    answers: { 200: roundSchema },
    controller: putVerdict,
  }),
  defineRoute({
    method: 'post',
    path: '/api/builds/:buildId/rounds/:roundId/end',
    policy: 'edit-build',
    summary: 'Close or withdraw an open round',
    params: roundParams,
    body: endRoundRequestSchema,
    answers: { 200: roundSchema },
    controller: postRoundEnd,
  }),
  defineRoute({
    method: 'put',
    path: '/api/builds/:buildId/review-rules',
    policy: 'own-build',
    summary: 'Set what an approval needs, from the next round on',
    params: buildParams,
    body: reviewRulesSchema,
    answers: { 200: reviewRulesSchema },
    controller: putRules,
  }),
]
