import { fork, type ChildProcess } from 'node:child_process'
import type { BuildDocument } from '#shared/build/document.ts'
import type { Catalog, CatalogIndex } from '#shared/catalog/catalog.ts'
import { check } from '#shared/check/check.ts'
import type { CheckResult } from '#shared/check/result.ts'

/** Builds up to this size are checked at once: it takes less than handing them to another process. */
export const inlineParts = 60

/** No check may take longer; one that does is broken off, and its process with it. */
const most_ms = 60_000

/** Checks documents: small ones at once, large ones in a process of their own, so that nobody else waits. */
export interface CheckService {
  check(document: BuildDocument, catalog: CheckCatalog): Promise<CheckResult>
  close(): void
}

export interface CheckCatalog {
  data: Catalog
  index: CatalogIndex
  version: string
}

export interface CheckTask {
  id: number
  document: BuildDocument
  /** Sent where it differs from the one sent before. */
  catalog: Catalog | null
}

export type CheckAnswer = { id: number; result: CheckResult } | { id: number; error: string }

interface Waiting {
  resolve: (result: CheckResult) => void
  reject: (error: Error) => void
  timer: NodeJS.Timeout
}

/** One running process, with what it has been asked. */
interface Checker {
  process: ChildProcess
  catalogVersion: string
  waiting: Map<number, Waiting>
}

export function makeCheckService(): CheckService {
  let checker: Checker | undefined
  let next = 1

  function open(): Checker {
    const made: Checker = {
      process: fork(new URL('../jobs/checkProcess.ts', import.meta.url), {
        execArgv: ['--import', 'tsx'],
        env: {},
        serialization: 'advanced',
      }),
      catalogVersion: '',
      waiting: new Map(),
    }
    made.process.on('message', (answer) => settle(made, answer as CheckAnswer))
    made.process.once('exit', () => giveUp(made, new Error('the checker ended')))
    made.process.once('error', (error) => giveUp(made, error))
    made.process.unref()
    made.process.channel?.unref()
    return made
  }

  function giveUp(from: Checker, error: Error): void {
    if (checker === from) checker = undefined
    for (const { reject, timer } of from.waiting.values()) {
      clearTimeout(timer)
      reject(error)
    }
    from.waiting.clear()
    from.process.kill('SIGKILL')
  }

  function askProcess(document: BuildDocument, catalog: CheckCatalog): Promise<CheckResult> {
    checker ??= open()
    const asked = checker
    const fresh = asked.catalogVersion !== catalog.version
    asked.catalogVersion = catalog.version
    const task: CheckTask = { id: next++, document, catalog: fresh ? catalog.data : null }
    return new Promise((resolve, reject) => {
      const timer = setTimeout(() => giveUp(asked, new Error('the check took too long')), most_ms)
      asked.waiting.set(task.id, { resolve, reject, timer })
      asked.process.send(task)
    })
  }

  return {
    async check(document, catalog) {
      return document.parts.length <= inlineParts ? check(document, catalog.index) : askProcess(document, catalog)
    },
    close() {
      if (checker) giveUp(checker, new Error('the server stops'))
    },
  }
}

function settle(checker: Checker, answer: CheckAnswer): void {
  const asked = checker.waiting.get(answer.id)
  if (!asked) return
  checker.waiting.delete(answer.id)
  clearTimeout(asked.timer)
  if ('error' in answer) asked.reject(new Error(answer.error))
  else asked.resolve(answer.result)
}
