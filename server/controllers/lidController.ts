import type { LidSheetRequest } from '#shared/contract/lidSheet.ts'
import { exportName } from '../files/exportName.ts'
import type { Answer, Call } from '../middleware/call.ts'
import { lidSheetPdf } from '../services/lidService.ts'
import { userOf } from './signedIn.ts'

/** The lid sheet as a PDF, named after build and revision. Nothing is made for somebody who has gone away. */
export async function postLidSheet(call: Call<{ buildId: string }, unknown, LidSheetRequest>): Promise<Answer> {
  const { context, guest, params, body, response } = call
  const gone = new AbortController()
  response.once('close', () => gone.abort())
  const reader = guest ? { guest } : { userId: userOf(call).id }
  const { pdf, buildName, revision } = await lidSheetPdf(context, params.buildId, reader, body, gone.signal)
  return {
    status: 200,
    headers: {
      'Content-Type': 'application/pdf',
      'Content-Disposition': exportName(`${buildName} lid sheet revision ${revision}`, 'pdf'),
    },
    stream: async (to) => void to.end(pdf),
  }
}
