import type { z } from 'zod'
import type { TransferRequest } from '#shared/contract/account.ts'
import {
  acceptedInvitationSchema,
  invitationSchema,
  invitationViewSchema,
  memberSchema,
  membersAnswerSchema,
  type BuildRole,
  type Invitation,
  type Member,
} from '#shared/contract/build.ts'
import { request, requestNothing, step } from './client.ts'

export type Members = z.infer<typeof membersAnswerSchema>
export type InvitationView = z.infer<typeof invitationViewSchema>

const path = (buildId: string, rest: string): string => `/api/builds/${step(buildId)}/${rest}`

export const listMembers = (buildId: string, signal?: AbortSignal): Promise<Members> =>
  request(membersAnswerSchema, 'GET', path(buildId, 'members'), { signal })

export const invite = (buildId: string, email: string, role: Exclude<BuildRole, 'owner'>): Promise<Invitation> =>
  request(invitationSchema, 'POST', path(buildId, 'invitations'), { body: { email, role } })

export const withdrawInvitation = (buildId: string, invitationId: string): Promise<void> =>
  requestNothing('DELETE', path(buildId, `invitations/${step(invitationId)}`))

export const changeMember = (buildId: string, userId: string, role: BuildRole): Promise<Member> =>
  request(memberSchema, 'PATCH', path(buildId, `members/${step(userId)}`), { body: { role } })

export const removeMember = (buildId: string, userId: string): Promise<void> =>
  requestNothing('DELETE', path(buildId, `members/${step(userId)}`))

/** Hands the build over to another member. */
export const transferOwnership = (buildId: string, wanted: TransferRequest): Promise<void> =>
  requestNothing('POST', path(buildId, 'ownership'), { body: wanted })

export const readInvitation = (token: string): Promise<InvitationView> =>
  request(invitationViewSchema, 'GET', `/api/invitations/${step(token)}`, { anonymous: true })

export const acceptInvitation = (token: string): Promise<{ buildId: string }> =>
  request(acceptedInvitationSchema, 'POST', `/api/invitations/${step(token)}/accept`)
