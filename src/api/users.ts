import { z } from 'zod'
import { accountSchema, type Account, type InstallationRole } from '#shared/contract/session.ts'
import { request, step } from './client.ts'

export const listUsers = (signal?: AbortSignal): Promise<Account[]> =>
  request(z.array(accountSchema), 'GET', '/api/users', { signal })

export const updateUser = (userId: string, change: { role?: InstallationRole; disabled?: boolean }): Promise<Account> =>
  request(accountSchema, 'PATCH', `/api/users/${step(userId)}`, { body: change })
