import { z } from 'zod'
import { ownSessionSchema } from '#shared/contract/account.ts'
import { registerRequestSchema, sessionSchema, signInRequestSchema } from '#shared/contract/session.ts'
import { createAccount, createSession, deleteSession, readSession } from '../controllers/sessionController.ts'
import { deleteOtherSessions, deleteOwnSession, readOwnSessions } from '../controllers/ownSessionController.ts'
import { sessionParams } from './params.ts'
import { defineRoute } from './route.ts'

export const sessionRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/session',
    policy: 'anybody',
    summary: 'Who is signed in, and the token that changes carry',
    answers: { 200: sessionSchema },
    controller: readSession,
  }),
  defineRoute({
    method: 'post',
    path: '/api/session',
    policy: 'anybody',
    summary: 'Sign in',
    body: signInRequestSchema,
    rateLimit: 'sign-in',
    answers: { 200: sessionSchema },
    controller: createSession,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/session',
    policy: 'signed-in',
    summary: 'Sign out',
    answers: { 204: null },
    controller: deleteSession,
  }),
  defineRoute({
    method: 'get',
    path: '/api/sessions',
    policy: 'signed-in',
    summary: 'One’s own sessions, the latest used first',
    answers: { 200: z.array(ownSessionSchema) },
    controller: readOwnSessions,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/sessions',
    policy: 'signed-in',
    summary: 'End every session of one’s own but this one',
    answers: { 204: null },
    controller: deleteOtherSessions,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/sessions/:sessionId',
    policy: 'signed-in',
    summary: 'End one session of one’s own',
    params: sessionParams,
    answers: { 204: null },
    controller: deleteOwnSession,
  }),
  defineRoute({
    method: 'post',
    path: '/api/accounts',
    policy: 'anybody',
    summary: 'Register and sign in; the first account becomes administrator',
    body: registerRequestSchema,
    rateLimit: 'register',
    answers: { 201: sessionSchema },
    controller: createAccount,
  }),
]
