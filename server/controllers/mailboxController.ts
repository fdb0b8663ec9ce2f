import { ok, type Answer } from '../middleware/call.ts'
import { listMessages } from '../services/mailboxService.ts'

export async function readMailbox(): Promise<Answer> {
  return ok(await listMessages())
}
