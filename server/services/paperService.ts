import { fork, type ChildProcess } from 'node:child_process'
import type { Catalog } from '#shared/catalog/catalog.ts'
import type { LidPdfInput } from '../files/lidPdf.ts'
import type { CheckCatalog } from './checkService.ts'
import { Refusal } from './refusal.ts'

/** No paper may take longer; one that does is broken off, and its process with it. */
const most_ms = 60_000

/** Papers that may wait for their turn. */
const mostWaiting = 24

/** Makes papers in a process of their own, so that nobody else waits. */
export interface PaperService {
  /** The lid sheet as a PDF. Where `signal` fires, nobody waits for it any more, and it is not begun. */
  lid(input: LidPdfInput, catalog: CheckCatalog, signal: AbortSignal): Promise<Buffer>
  close(): void
}

export type PaperTask = { id: number; input: LidPdfInput; catalog: Catalog | null } | { drop: number }
export type PaperAnswer = { id: number; pdf: Uint8Array } | { id: number; error: string }

interface Waiting {
  resolve: (pdf: Buffer) => void
  reject: (error: Error) => void
  timer: NodeJS.Timeout
}

interface Maker {
  process: ChildProcess
  catalogVersion: string
  waiting: Map<number, Waiting>
}

export function makePaperService(): PaperService {
  let maker: Maker | undefined
  let next = 1

  function open(): Maker {
    const made: Maker = {
      process: fork(new URL('../jobs/paperProcess.ts', import.meta.url), {
        execArgv: ['--import', 'tsx'],
        env: {},
        serialization: 'advanced',
      }),
      catalogVersion: '',
      waiting: new Map(),
    }
    made.process.on('message', (answer) => settle(made, answer as PaperAnswer))
    made.process.once('exit', () => giveUp(made, new Error('the maker of papers ended')))
    made.process.once('error', (error) => giveUp(made, error))
    made.process.unref()
    made.process.channel?.unref()
    return made
  }

  function giveUp(from: Maker, error: Error): void {
    if (maker === from) maker = undefined
    for (const { reject, timer } of from.waiting.values()) {
      clearTimeout(timer)
      reject(error)
    }
    from.waiting.clear()
    from.process.kill('SIGKILL')
  }

  return {
    lid(input, catalog, signal) {
      maker ??= open()
      const asked = maker
      if (asked.waiting.size >= mostWaiting) throw new Refusal('too-many-requests', { retryAfter_s: 10 })
      const fresh = asked.catalogVersion !== catalog.version
      asked.catalogVersion = catalog.version
      const id = next++
      return new Promise((resolve, reject) => {
        const timer = setTimeout(() => giveUp(asked, new Error('the paper took too long')), most_ms)
        asked.waiting.set(id, { resolve, reject, timer })
        asked.process.send({ id, input, catalog: fresh ? catalog.data : null } satisfies PaperTask)
        signal.addEventListener('abort', () => {
          const waiting = asked.waiting.get(id)
          if (!waiting) return
          asked.waiting.delete(id)
          clearTimeout(waiting.timer)
          asked.process.send({ drop: id } satisfies PaperTask)
          reject(new Error('nobody waits for it any more'))
        })
      })
    },
    close() {
      if (maker) giveUp(maker, new Error('the server stops'))
    },
  }
}

function settle(maker: Maker, answer: PaperAnswer): void {
  const asked = maker.waiting.get(answer.id)
  if (!asked) return
  maker.waiting.delete(answer.id)
  clearTimeout(asked.timer)
  if ('error' in answer) asked.reject(new Error(answer.error))
  else asked.resolve(Buffer.from(answer.pdf))
}
