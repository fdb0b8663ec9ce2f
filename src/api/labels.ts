import type { LabelsRequest } from '#shared/contract/labels.ts'
import { requestFile, step } from './client.ts'

/** Labels on sheets, as a PDF. */
export const labelsPdf = (buildId: string, wanted: Partial<LabelsRequest>): Promise<Blob> =>
  requestFile('POST', `/api/builds/${step(buildId)}/labels`, { body: wanted })
