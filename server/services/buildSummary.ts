import type { BuildDocument } from '#shared/build/document.ts'
import type { ResolvedBuild } from '#shared/build/resolve.ts'
import type { CheckResult } from '#shared/check/result.ts'
import type { Severity } from '#shared/check/severity.ts'
import type { Context } from './context.ts'
import type { CurrentCatalog } from './catalogService.ts'
import { inlineParts } from './checkService.ts'

/** What the list shows of a document without checking it. */
export const contentColumns = (document: BuildDocument, resolved: ResolvedBuild) => ({
  name: document.name,
  machine: document.machine ?? null,
  parts: document.parts.length,
  drives: resolved.parts.filter((part) => part.model.kind === 'drive').length,
})

export interface VerdictColumns {
  worst: Severity | null
  dangers: number
  faults: number
  cautions: number
  notes: number
  checkedRevision: number
}

export const verdictColumns = (result: CheckResult, revision: number): VerdictColumns => ({
  worst: result.worst,
  dangers: result.counts.danger,
  faults: result.counts.fault,
  cautions: result.counts.caution,
  notes: result.counts.note,
  checkedRevision: revision,
})

/**
 * The verdict on a document that is being saved, where it comes at once. Large documents are left to the check job; a
 * checker that breaks off never costs anybody a save.
 */
export async function promptVerdict(
  context: Context,
  document: BuildDocument,
  catalog: CurrentCatalog,
  revision: number,
): Promise<Partial<VerdictColumns> | { checkFailedRevision: number }> {
  if (document.parts.length > inlineParts) return {}
  try {
    return verdictColumns(await context.checks.check(document, catalog), revision)
  } catch (error) {
    context.log.error({ err: error }, 'check broke off')
    return { checkFailedRevision: revision }
  }
}
