import {
  acceptedInvitationSchema,
  invitationSchema,
  invitationViewSchema,
  inviteRequestSchema,
} from '#shared/contract/build.ts'
import {
  deleteInvitation,
  postAcceptance,
  postInvitation,
  readInvitation,
} from '../controllers/invitationController.ts'
import { buildParams, invitationParams, tokenParams } from './params.ts'
import { defineRoute } from './route.ts'

export const invitationRoutes = [
  defineRoute({
    method: 'post',
    path: '/api/builds/:buildId/invitations',
    policy: 'own-build',
    summary: 'Invite somebody by mail',
    params: buildParams,
    body: inviteRequestSchema,
    rateLimit: 'invite',
    answers: { 201: invitationSchema },
    controller: postInvitation,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/builds/:buildId/invitations/:invitationId',
    policy: 'own-build',
    summary: 'Withdraw an invitation',
    params: invitationParams,
    answers: { 204: null },
    controller: deleteInvitation,
  }),
  defineRoute({
    method: 'get',
    path: '/api/invitations/:token',
    policy: 'anybody',
    summary: 'What an invitation link leads to',
    params: tokenParams,
    rateLimit: 'use-link',
    answers: { 200: invitationViewSchema },
    controller: readInvitation,
  }),
  defineRoute({
    method: 'post',
    path: '/api/invitations/:token/accept',
    policy: 'signed-in',
    summary: 'Join the build',
    params: tokenParams,
    rateLimit: 'use-link',
    answers: { 200: acceptedInvitationSchema },
    controller: postAcceptance,
  }),
]
