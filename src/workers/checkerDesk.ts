import { apply } from '#shared/build/apply.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { indexCatalog } from '#shared/catalog/catalog.ts'
import { createChecker } from '#shared/check/incremental.ts'
import type { CheckerAnswer, CheckerRequest } from './messages.ts'

/** The checker's side of the talk, apart from the worker that it lives in, so that it can be tested without one. */
export function createDesk(
  answer: (message: CheckerAnswer) => void,
  soon: (run: () => void) => void,
  now: () => number,
) {
  let checker: ReturnType<typeof createChecker> | null = null
  let document: BuildDocument | null = null
  let version = 0
  let queued = false

  function receive(request: CheckerRequest): void {
    if (request.kind === 'catalog') {
      checker = createChecker(indexCatalog(request.catalog))
      return
    }
    if (request.kind === 'changes') {
      if (!document || request.version !== version + 1) return lose(request.version)
      try {
        document = apply(document, request.changes)
      } catch {
        return lose(request.version)
      }
    } else document = request.document
    version = request.version
    // Everything that already stands in the queue is read first: only the newest state is worth judging.
    if (!queued) {
      queued = true
      soon(judge)
    }
  }

  function lose(at: number): void {
    document = null
    answer({ kind: 'lost', version: at })
  }

  function judge(): void {
    queued = false
    if (!checker || !document) return
    const started = now()
    try {
      const result = checker(document)
      answer({ kind: 'result', version, result, took_ms: now() - started })
    } catch (error) {
      answer({ kind: 'failed', version, message: error instanceof Error ? error.message : 'unknown' })
    }
  }

  return { receive }
}
