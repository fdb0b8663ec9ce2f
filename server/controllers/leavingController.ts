import { once } from 'node:events'
import { exportName } from '../files/exportName.ts'
import { nothing, ok, type Answer, type Call } from '../middleware/call.ts'
import { clearSessionCookies } from '../middleware/cookies.ts'
import { exportAccount } from '../services/accountExport.ts'
import { deleteAccount, whatLeavingDoes } from '../services/leavingService.ts'
import { userOf } from './signedIn.ts'

export async function readLeaving(call: Call): Promise<Answer> {
  return ok(await whatLeavingDoes(call.context, userOf(call).id))
}

/** Written as it is read: a person may have thousands of revisions. */
export function downloadAccount(call: Call): Answer {
  const { id, name } = userOf(call)
  return {
    status: 200,
    headers: {
      'Content-Type': 'application/json; charset=utf-8',
      'Content-Disposition': exportName(`Bayloom account of ${name}`),
    },
    async stream(response) {
      for await (const piece of exportAccount(call.context, id)) {
        if (response.closed) return
        if (!response.write(piece)) await Promise.race([once(response, 'drain'), once(response, 'close')])
      }
      response.end()
    },
  }
}

export async function deleteOwnAccount(call: Call<unknown, unknown, { password: string }>): Promise<Answer> {
  await deleteAccount(call.context, userOf(call).id, call.body.password)
  clearSessionCookies(call.context.config, call.response)
  return nothing
}
