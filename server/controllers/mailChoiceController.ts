import type { MailChoice } from '#shared/contract/mailChoices.ts'
import { ok, type Answer, type Call } from '../middleware/call.ts'
import { chooseMail, mailChoices, resubscribe, unsubscribe } from '../services/mailChoiceService.ts'
import { userOf } from './signedIn.ts'

export async function readMailChoices(call: Call): Promise<Answer> {
  return ok(await mailChoices(call.context, userOf(call).email))
}

export async function putMailChoice(call: Call<unknown, unknown, MailChoice>): Promise<Answer> {
  const { email } = userOf(call)
  await chooseMail(call.context, email, call.body.kind, call.body.timing)
  return ok(await mailChoices(call.context, email))
}

export async function postUnsubscribe({ context, params }: Call<{ token: string }>): Promise<Answer> {
  return ok(await unsubscribe(context, params.token))
}

export async function postResubscribe({ context, params }: Call<{ token: string }>): Promise<Answer> {
  return ok(await resubscribe(context, params.token))
}
