import { onScopeDispose, toRaw, watch } from 'vue'
import type { Catalog } from '#shared/catalog/catalog.ts'
import { useChecksStore } from '../stores/checks.ts'
import { useDiagramStore } from '../stores/diagram.ts'
import type { CheckerAnswer, CheckerRequest } from '../workers/messages.ts'

/**
 * Has the open document judged off the main thread. An edit travels as its changes; the whole document only when it
 * was opened or replaced. Answers to anything but the newest version are dropped.
 */
export function useChecker(catalog: () => Catalog | undefined): void {
  const diagram = useDiagramStore()
  const checks = useChecksStore()
  const worker = new Worker(new URL('../workers/checker.worker.ts', import.meta.url), { type: 'module' })
  let version = 0
  /** Document that the worker has, as far as this page knows. */
  let sent: unknown = null

  const post = (message: CheckerRequest) => worker.postMessage(message)

  function sendDocument(): void {
    const document = toRaw(diagram.document)
    if (!document || !catalog()) return
    sent = document
    checks.isPending = true
    post({ kind: 'document', version: ++version, document })
  }

  worker.onmessage = (event: MessageEvent<CheckerAnswer>) => {
    const answer = event.data
    if (answer.version !== version) return
    if (answer.kind === 'lost') return sendDocument()
    checks.isPending = false
    if (answer.kind === 'failed') {
      checks.trouble = answer.message
      return
    }
    checks.trouble = null
    checks.result = answer.result
    checks.took_ms = answer.took_ms
  }
  worker.onerror = (event) => {
    checks.isPending = false
    checks.trouble = event.message || 'the checker did not start'
  }

  const stopEdits = diagram.onEdit((edit, before, after) => {
    if (toRaw(before) !== sent) return sendDocument()
    sent = toRaw(after)
    checks.isPending = true
    post({ kind: 'changes', version: ++version, changes: edit.changes })
  })
  watch(
    catalog,
    (known) => {
      if (!known) return
      post({ kind: 'catalog', catalog: toRaw(known) })
      sendDocument()
    },
    { immediate: true },
  )
  watch(
    () => diagram.document,
    (document) => {
      if (document && toRaw(document) !== sent) sendDocument()
    },
  )

  onScopeDispose(() => {
    stopEdits()
    worker.terminate()
    checks.result = null
    checks.isPending = false
  })
}
