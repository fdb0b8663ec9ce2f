import type { z } from 'zod'
import type {
  askResetRequestSchema,
  changePasswordRequestSchema,
  resetPasswordRequestSchema,
  updateAccountRequestSchema,
} from '#shared/contract/session.ts'
import { nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { changePassword, resetPassword, updateAccount } from '../services/accountService.ts'
import { askPasswordReset } from '../services/passwordResetService.ts'
import { signedInOf, userOf } from './signedIn.ts'

export async function patchAccount(
  call: Call<unknown, unknown, z.output<typeof updateAccountRequestSchema>>,
): Promise<Answer> {
  return ok(await updateAccount(userOf(call).id, call.body))
}

export async function putPassword(
  call: Call<unknown, unknown, z.output<typeof changePasswordRequestSchema>>,
): Promise<Answer> {
  await changePassword(call.context, signedInOf(call), call.body)
  return nothing
}

export async function createPasswordReset({
  context,
  body,
}: Call<unknown, unknown, z.output<typeof askResetRequestSchema>>): Promise<Answer> {
  await askPasswordReset(context, body.email)
  return { status: 202 }
}

export async function usePasswordReset({
  context,
  params,
  body,
}: Call<{ token: string }, unknown, z.output<typeof resetPasswordRequestSchema>>): Promise<Answer> {
  await resetPassword(context, params.token, body.password)
  return nothing
}
