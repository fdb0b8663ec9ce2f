import type { z } from 'zod'
import type { updateUserRequestSchema } from '#shared/contract/session.ts'
import { ok, type Answer, type Call } from '../middleware/call.ts'
import { listUsers, updateUser } from '../services/userService.ts'
import { userOf } from './signedIn.ts'

export async function readUsers(): Promise<Answer> {
  return ok(await listUsers())
}

export async function patchUser(
  call: Call<{ userId: string }, unknown, z.output<typeof updateUserRequestSchema>>,
): Promise<Answer> {
  const account = await updateUser(call.context, call.params.userId, call.body)
  call.context.log.info({ by: userOf(call).id, user: account.id, ...call.body }, 'account changed')
  return ok(account)
}
