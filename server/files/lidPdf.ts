import type { BuildDocument } from '#shared/build/document.ts'
import { resolve } from '#shared/build/resolve.ts'
import type { CatalogIndex } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import type { LidSheetRequest } from '#shared/contract/lidSheet.ts'
import type { ReviewState } from '#shared/contract/reviewState.ts'
import { arrange } from '#shared/layout/arrange.ts'
import { lidContent } from '#shared/paper/lid/make.ts'
import { lidPages } from '#shared/paper/lid/pages.ts'
import { codeModules } from './codeModules.ts'
import { paperPdf } from './paperPdf.ts'

export interface LidPdfInput {
  document: BuildDocument
  revision: number
  review: ReviewState
  request: Omit<LidSheetRequest, 'revision'>
}

/** The lid sheet of a document as a PDF: checked, arranged, composed, drawn. */
export async function lidPdf({ document, revision, review, request }: LidPdfInput, catalog: CatalogIndex) {
  const build = resolve(document, catalog)
  const result = check(document, catalog)
  const moment = result.moments.find(({ applies }) => applies)?.moment ?? 'cold-start'
  const content = lidContent({ build, result, revision, review, ...request })
  const code = codeModules(content.address)
  return paperPdf(lidPages({ content, code, diagram: { build, drawing: arrange(build), result, moment } }, request))
}
