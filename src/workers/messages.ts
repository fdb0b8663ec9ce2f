import type { Change } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import type { Catalog } from '#shared/catalog/catalog.ts'
import type { CheckResult } from '#shared/check/result.ts'

/** What the page sends: the catalog once, then a document, then edits of it. Versions rise by one. */
export type CheckerRequest =
  | { kind: 'catalog'; catalog: Catalog }
  | { kind: 'document'; version: number; document: BuildDocument }
  | { kind: 'changes'; version: number; changes: Change[] }

/** What the checker answers, with the version that it judged. */
export type CheckerAnswer =
  | { kind: 'result'; version: number; result: CheckResult; took_ms: number }
  /** It lost track, as after a change that it cannot apply: send the document again. */
  | { kind: 'lost'; version: number }
  | { kind: 'failed'; version: number; message: string }
