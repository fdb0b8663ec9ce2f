import type { z } from 'zod'
import type { updateUserRequestSchema } from '#shared/contract/session.ts'
import { ok, type Answer, type Call } from '../middleware/call.ts'
import { listUsers, updateUser } from '../services/userService.ts'

export async function readUsers(): Promise<Answer> {
  return ok(await listUsers())
}

export async function patchUser({
  context,
  params,
  body,
}: Call<{ userId: string }, unknown, z.output<typeof updateUserRequestSchema>>): Promise<Answer> {
  return ok(await updateUser(context, params.userId, body))
}
