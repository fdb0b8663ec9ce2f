import { sessionSchema, type Session } from '#shared/contract/session.ts'
import { request, requestNothing } from './client.ts'

export const readSession = (): Promise<Session> => request(sessionSchema, 'GET', '/api/session', { anonymous: true })

export const signIn = (email: string, password: string): Promise<Session> =>
  request(sessionSchema, 'POST', '/api/session', { body: { email, password }, anonymous: true })

export const signOut = (): Promise<void> => requestNothing('DELETE', '/api/session', { anonymous: true })
