import type { LidSheetRequest } from '#shared/contract/lidSheet.ts'
import { findOpenBuild } from './buildList.ts'
import type { Context } from './context.ts'
import type { KnownGuest } from './guestService.ts'
import { Refusal } from './refusal.ts'
import { readDocument } from './revisionStore.ts'

export interface LidPdf {
  pdf: Buffer
  buildName: string
  revision: number
}

/** The lid sheet of one revision as a PDF, made beside the server. */
export async function lidSheetPdf(
  context: Context,
  buildId: string,
  reader: { userId: string } | { guest: KnownGuest },
  { revision: wanted, ...request }: LidSheetRequest,
  signal: AbortSignal,
): Promise<LidPdf> {
  const build = await findOpenBuild(context.database, buildId, reader)
  if (!build) throw new Refusal('not-found')
  const revision = wanted ?? build.revision
  const document =
    revision === build.revision ? build.document : await readDocument(context.database, buildId, revision)
  const input = { document, revision, review: build.review, request }
  const pdf = await context.papers.lid(input, await context.catalog.current(), signal)
  return { pdf, buildName: document.name, revision }
}
