import { transferRequestSchema } from '#shared/contract/account.ts'
import { changeMemberRequestSchema, membersAnswerSchema, memberSchema } from '#shared/contract/build.ts'
import { deleteMember, patchMember, postOwnership, readMembers } from '../controllers/memberController.ts'
import { buildParams, memberParams } from './params.ts'
import { defineRoute } from './route.ts'

export const memberRoutes = [
  defineRoute({
    method: 'get',
    path: '/api/builds/:buildId/members',
    policy: 'read-build',
    summary: 'The people of a build; its owners also see open invitations',
    params: buildParams,
    answers: { 200: membersAnswerSchema },
    controller: readMembers,
  }),
  defineRoute({
    method: 'patch',
    path: '/api/builds/:buildId/members/:userId',
    policy: 'own-build',
    summary: 'Change a person’s role',
    params: memberParams,
    body: changeMemberRequestSchema,
    answers: { 200: memberSchema },
    controller: patchMember,
  }),
  defineRoute({
    method: 'delete',
    path: '/api/builds/:buildId/members/:userId',
    policy: 'remove-member',
    summary: 'Take a person out of a build, or leave it oneself',
    params: memberParams,
    answers: { 204: null },
    controller: deleteMember,
  }),
  defineRoute({
    method: 'post',
    path: '/api/builds/:buildId/ownership',
    policy: 'own-build',
    summary: 'Hand the build over to another member, and stay as owner or editor, or leave',
    params: buildParams,
    body: transferRequestSchema,
    answers: { 204: null },
    controller: postOwnership,
  }),
]
