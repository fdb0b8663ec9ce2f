import { sessionSchema, userSchema, type Session, type User } from '#shared/contract/session.ts'
import { request, requestNothing, step } from './client.ts'

export const register = (account: { email: string; name: string; password: string }): Promise<Session> =>
  request(sessionSchema, 'POST', '/api/accounts', { body: account, anonymous: true })

export const updateAccount = (change: { name: string }): Promise<User> =>
  request(userSchema, 'PATCH', '/api/account', { body: change })

export const changePassword = (current: string, next: string): Promise<void> =>
  requestNothing('PUT', '/api/account/password', { body: { current, next } })

export const askReset = (email: string): Promise<void> =>
  requestNothing('POST', '/api/password-resets', { body: { email }, anonymous: true })

export const resetPassword = (token: string, password: string): Promise<void> =>
  requestNothing('PUT', `/api/password-resets/${step(token)}`, { body: { password }, anonymous: true })
