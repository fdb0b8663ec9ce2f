import type { ListMailbox } from '#shared/contract/mailbox.ts'
import { ok, type Answer, type Call } from '../middleware/call.ts'
import { listMessages, tryAgain } from '../services/mailboxService.ts'

export async function readMailbox({ query }: Call<unknown, ListMailbox>): Promise<Answer> {
  return ok(await listMessages(query))
}

export async function postAgain({ context, params }: Call<{ messageId: string }>): Promise<Answer> {
  return ok(await tryAgain(context, params.messageId))
}
