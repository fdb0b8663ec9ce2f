import { apply } from '#shared/build/apply.ts'
import type { Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import type { SaveAnswer, SaveRequest } from '#shared/contract/build.ts'
import type { Draft, DraftStore } from '../../../../src/stores/save/draft.ts'
import { SaveFailure } from '../../../../src/stores/save/failure.ts'

/** A server in memory that keeps revisions, merges what touches other parts, and answers a repeated request once. */
export function fakeServer(first: BuildDocument) {
  const log: { edits: Edit[]; document: BuildDocument }[] = [{ edits: [], document: first }]
  const answers = new Map<string, SaveAnswer>()
  let mode: 'up' | 'down' | 'loses-answers' | 'signed-out' | 'refuses' = 'up'
  let received = 0
  const newest = () => log.at(-1)?.document ?? first

  function save(edits: Edit[]): void {
    log.push({ edits, document: edits.reduce((document, edit) => apply(document, edit.changes), newest()) })
  }

  return {
    set mode(value: typeof mode) {
      mode = value
    },
    get received() {
      return received
    },
    get revision() {
      return log.length
    },
    newest,
    /** Somebody else saves. */
    save,
    async send(request: SaveRequest): Promise<SaveAnswer> {
      await Promise.resolve()
      if (mode === 'down') throw new SaveFailure('offline', 'no connection')
      if (mode === 'signed-out') throw new SaveFailure('session', 'signed out')
      if (mode === 'refuses') throw new SaveFailure('refused', 'a joint leads nowhere')
      received++
      const known = answers.get(request.requestId)
      if (known) return known
      const merged = log.slice(request.base).flatMap((entry) => entry.edits)
      const clashes = touched(merged).filter((id) => touched(request.edits).includes(id))
      if (clashes.length > 0)
        throw new SaveFailure('conflict', 'changed meanwhile', {
          revision: log.length,
          theirs: merged,
          clashes,
          document: newest(),
        })
      save(request.edits)
      const answer = { revision: log.length, savedAt: '2026-12-01T10:00:00Z', merged }
      answers.set(request.requestId, answer)
      if (mode === 'loses-answers') throw new SaveFailure('offline', 'the answer got lost')
      return answer
    },
    async pull() {
      await Promise.resolve()
      if (mode === 'down') throw new SaveFailure('offline', 'no connection')
      return { revision: log.length, document: newest() }
    },
  }
}

const touched = (edits: readonly Edit[]): string[] =>
  edits.flatMap((edit) => edit.changes.flatMap((change) => ('id' in change ? change.id : [])))

/** Drafts in memory, copied as a database copies. */
export function memoryDrafts(): DraftStore & { kept: Map<string, Draft> } {
  const kept = new Map<string, Draft>()
  return {
    kept,
    async put(draft) {
      kept.set(draft.key, structuredClone(draft))
      await Promise.resolve()
    },
    async remove(key) {
      kept.delete(key)
      await Promise.resolve()
    },
    async list(buildId) {
      await Promise.resolve()
      return [...kept.values()].filter((draft) => draft.buildId === buildId)
    },
  }
}

/** Time that stands still until it is told to go on. */
export function fakeClock() {
  let now = 0
  let next: { at: number; run: () => void } | null = null
  return {
    now: () => now,
    later(run: () => void, ms: number) {
      const timer = { at: now + ms, run }
      next = timer
      return () => {
        if (next === timer) next = null
      }
    },
    get pending() {
      return next !== null
    },
    advance(ms: number) {
      now += ms
      if (next && next.at <= now) {
        const { run } = next
        next = null
        run()
      }
    },
  }
}
