import { z } from 'zod'
import {
  buildLinkSchema,
  joinedSchema,
  linkViewSchema,
  madeLinkSchema,
  type BuildLink,
  type JoinRequest,
  type LinkView,
  type MadeLink,
  type MakeLinkRequest,
} from '#shared/contract/buildLinks.ts'
import { request, requestNothing, step } from './client.ts'

const path = (buildId: string, rest: string): string => `/api/builds/${step(buildId)}/${rest}`

export const listLinks = (buildId: string, signal?: AbortSignal): Promise<BuildLink[]> =>
  request(z.array(buildLinkSchema), 'GET', path(buildId, 'links'), { signal })

export const makeLink = (buildId: string, wanted: MakeLinkRequest): Promise<MadeLink> =>
  request(madeLinkSchema, 'POST', path(buildId, 'links'), { body: wanted })

export const revokeLink = (buildId: string, linkId: string): Promise<void> =>
  requestNothing('DELETE', path(buildId, `links/${step(linkId)}`))

export const closeOutGuest = (buildId: string, guestId: string): Promise<void> =>
  requestNothing('DELETE', path(buildId, `guests/${step(guestId)}`))

export const readLink = (token: string): Promise<LinkView> =>
  request(linkViewSchema, 'GET', `/api/links/${step(token)}`, { anonymous: true })

export const joinByLink = (token: string, who: JoinRequest): Promise<{ buildId: string }> =>
  request(joinedSchema, 'POST', `/api/links/${step(token)}/guests`, { body: who, anonymous: true })

export const leaveAsGuest = (): Promise<void> => requestNothing('DELETE', '/api/guest', { anonymous: true })
