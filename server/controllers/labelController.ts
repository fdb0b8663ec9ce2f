import type { LabelsRequest } from '#shared/contract/labels.ts'
import { exportName } from '../files/exportName.ts'
import type { Answer, Call } from '../middleware/call.ts'
import { labelsPdf } from '../services/labelService.ts'

/** Labels as a PDF to print, named after build and revision. */
export async function postLabels(call: Call<{ buildId: string }, unknown, LabelsRequest>): Promise<Answer> {
  const { pdf, buildName, revision } = await labelsPdf(call.context, call.params.buildId, call.body)
  return {
    status: 200,
    headers: {
      'Content-Type': 'application/pdf',
      'Content-Disposition': exportName(`${buildName} labels revision ${revision}`, 'pdf'),
    },
    stream: async (response) => void response.end(pdf),
  }
}
