import type { LidSheetRequest } from '#shared/contract/lidSheet.ts'
import { requestFile, step } from './client.ts'

/** The lid sheet of a saved revision, as a PDF. */
export const lidSheetPdf = (buildId: string, wanted: LidSheetRequest, signal: AbortSignal): Promise<Blob> =>
  requestFile('POST', `/api/builds/${step(buildId)}/lid-sheet`, { body: wanted, signal })
