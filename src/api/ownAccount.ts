import { z } from 'zod'
import { leavingSchema, ownSessionSchema, type Leaving, type OwnSession } from '#shared/contract/account.ts'
import { request, requestNothing, step } from './client.ts'

export const listOwnSessions = (signal?: AbortSignal): Promise<OwnSession[]> =>
  request(z.array(ownSessionSchema), 'GET', '/api/sessions', { signal })

export const endOwnSession = (sessionId: string): Promise<void> =>
  requestNothing('DELETE', `/api/sessions/${step(sessionId)}`)

export const endOtherSessions = (): Promise<void> => requestNothing('DELETE', '/api/sessions')

/** What deleting one's account would do to builds. */
export const readLeaving = (signal?: AbortSignal): Promise<Leaving> =>
  request(leavingSchema, 'GET', '/api/account/leaving', { signal })

export const deleteAccount = (password: string): Promise<void> =>
  requestNothing('DELETE', '/api/account', { body: { password } })

/** Everything of one's own as one file: a link, so that the browser writes it as it comes. */
export const accountExportPath = '/api/account/export'
