import { Worker } from 'node:worker_threads'
import type { BuildDocument } from '#shared/build/document.ts'
import type { Catalog, CatalogIndex } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import type { CheckResult } from '#shared/check/result.ts'

/** Builds up to this size are checked at once: it takes less than handing them to another thread. */
export const inlineParts = 400

/** Checks documents: small ones at once, large ones on a thread of their own, so that nobody else waits. */
export interface CheckService {
  check(document: BuildDocument, catalog: { data: Catalog; index: CatalogIndex; version: string }): Promise<CheckResult>
  close(): Promise<void>
}

interface Waiting {
  resolve: (result: CheckResult) => void
  reject: (error: Error) => void
}

export interface CheckTask {
  id: number
  document: BuildDocument
  /** Sent when it differs from the one sent before. */
  catalog: Catalog | null
}

export type CheckAnswer = { id: number; result: CheckResult } | { id: number; error: string }

export function makeCheckService(): CheckService {
  const waiting = new Map<number, Waiting>()
  let worker: Worker | undefined
  let sentVersion: string | undefined
  let next = 1

  function failAll(error: Error): void {
    for (const { reject } of waiting.values()) reject(error)
    waiting.clear()
    worker = undefined
    sentVersion = undefined
  }

  function openWorker(): Worker {
    const made = new Worker(new URL('../jobs/checkWorker.ts', import.meta.url), { execArgv: ['--import', 'tsx'] })
    made.on('message', (answer: CheckAnswer) => {
      const task = waiting.get(answer.id)
      waiting.delete(answer.id)
      if ('error' in answer) task?.reject(new Error(answer.error))
      else task?.resolve(answer.result)
    })
    made.on('error', (error) => failAll(error instanceof Error ? error : new Error(String(error))))
    made.unref()
    return made
  }

  return {
    async check(document, catalog) {
      if (document.parts.length <= inlineParts) return check(document, catalog.index)
      worker ??= openWorker()
      const task: CheckTask = {
        id: next++,
        document,
        catalog: sentVersion === catalog.version ? null : catalog.data,
      }
      sentVersion = catalog.version
      const answered = new Promise<CheckResult>((resolve, reject) => waiting.set(task.id, { resolve, reject }))
      worker.postMessage(task)
      return answered
    },
    async close() {
      const open = worker
      failAll(new Error('the checker was closed'))
      await open?.terminate()
    },
  }
}
