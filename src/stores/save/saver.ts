import { apply, ChangeError } from '#shared/build/apply.ts'
import type { Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { rebase, type DroppedChange } from '#shared/build/edits/rebase.ts'
import type { SaveAnswer, SaveRequest } from '#shared/contract/build.ts'
import type { Draft, DraftStore, Sending } from './draft.ts'
import { SaveFailure, type Conflict } from './failure.ts'
import type { SaveState } from './state.ts'

/** The newest state of the build on the server. */
export interface Pulled {
  revision: number
  document: BuildDocument
}

export interface SaverOptions {
  /** What was opened, or a draft that an earlier page left behind. */
  draft: Draft
  /** Rejects with a `SaveFailure`. */
  send: (request: SaveRequest) => Promise<SaveAnswer>
  pull: () => Promise<Pulled>
  drafts: DraftStore
  makeRequestId: () => string
  now: () => number
  /** Calls back after a while; the result cancels. */
  later: (run: () => void, ms: number) => () => void
  onState: (state: SaveState) => void
  /** The document changed under the person's hands: others' edits came in beneath their own. */
  onDocument: (document: BuildDocument, dropped: readonly DroppedChange[]) => void
  /** A save was acknowledged; other tabs may want to know. */
  onSaved?: (revision: number) => void
}

export interface Saver {
  add(edit: Edit): void
  /** Sends what waits, now. Resolves when the attempt is over. */
  flush(): Promise<void>
  /** Takes in what others saved, unless something is on its way. */
  refresh(): Promise<void>
  /** Ends a conflict: the edits given go on top of the server's document. */
  settle(document: BuildDocument, edits: readonly Edit[]): Promise<void>
  /** Gives up what is unsaved and takes the server's document. */
  discard(): Promise<void>
  state(): SaveState
  unsaved(): number
  /** Everything that is not acknowledged yet, oldest first. */
  pending(): readonly Edit[]
  close(): void
}

/** Edits wait this long for more to come, so that a burst is one revision. */
const pause_ms = 700
const firstRetry_ms = 2_000
const longestRetry_ms = 30_000
/** Most edits in one request, as the contract says. */
const mostEdits = 500

/**
 * Sends edits to the server one request at a time and keeps whatever is not acknowledged on this computer. A request
 * whose answer got lost is sent again under the same id, so that it counts once.
 */
export function createSaver(options: SaverOptions): Saver {
  let { base, baseDocument, sending, waiting } = options.draft
  let trouble: { kind: 'offline' | 'session' } | { kind: 'refused'; reason: string } | null = null
  let conflict: Conflict | null = null
  let running: Promise<void> | null = null
  let cancelTimer = () => {}
  let retry_ms = firstRetry_ms
  let closed = false

  const unsaved = () => (sending?.edits.length ?? 0) + waiting.length

  function state(): SaveState {
    const common = { revision: base, unsaved: unsaved() }
    if (conflict) return { kind: 'conflict', ...common, conflict }
    if (unsaved() === 0) return { kind: 'saved', revision: base }
    if (trouble) return { ...trouble, ...common }
    return { kind: 'saving', revision: base }
  }

  function persist(): void {
    const { key, buildId } = options.draft
    const draft = { key, buildId, base, baseDocument, sending, waiting, savedAt: options.now() }
    void (unsaved() === 0 ? options.drafts.remove(key) : options.drafts.put(draft))
  }

  function changed(): void {
    persist()
    options.onState(state())
  }

  function schedule(ms: number): void {
    cancelTimer()
    if (!closed) cancelTimer = options.later(() => void flush(), ms)
  }

  function add(edit: Edit): void {
    waiting = [...waiting, edit]
    changed()
    if (!conflict && !trouble && !running) schedule(pause_ms)
  }

  function flush(): Promise<void> {
    cancelTimer()
    running ??= drain().finally(() => {
      running = null
      if (!closed && !conflict && !trouble && unsaved() > 0) schedule(pause_ms)
    })
    return running
  }

  async function drain(): Promise<void> {
    while (!closed && !conflict && unsaved() > 0) {
      if (!sending) {
        sending = { requestId: options.makeRequestId(), edits: waiting.slice(0, mostEdits) }
        waiting = waiting.slice(mostEdits)
        changed()
      }
      try {
        await acknowledge(sending, await options.send({ base, ...sending }))
      } catch (error) {
        if (closed) return
        fail(error)
        return
      }
    }
  }

  async function acknowledge(sent: Sending, answer: SaveAnswer): Promise<void> {
    const others = answer.merged.flatMap((edit) => edit.changes)
    const known = onTop(others, sent)
    const next: Pulled = known ? { revision: answer.revision, document: known } : await options.pull()
    base = next.revision
    baseDocument = next.document
    sending = null
    trouble = null
    retry_ms = firstRetry_ms
    if (others.length > 0 || !known) showRebased()
    changed()
    options.onSaved?.(base)
  }

  /** The server's document as it must be now; null where that cannot be worked out here. */
  function onTop(others: Edit['changes'], sent: Sending): BuildDocument | null {
    try {
      const theirs = apply(baseDocument, others)
      return apply(
        theirs,
        sent.edits.flatMap((edit) => edit.changes),
      )
    } catch (error) {
      if (error instanceof ChangeError) return null
      throw error
    }
  }

  function showRebased(): void {
    const own = rebase(baseDocument, waiting)
    waiting = own.edits
    options.onDocument(own.document, own.dropped)
  }

  function fail(error: unknown): void {
    if (!(error instanceof SaveFailure)) throw error
    if (error.kind === 'conflict' && error.conflict) conflict = error.conflict
    else if (error.kind === 'refused') trouble = { kind: 'refused', reason: error.message }
    else if (error.kind !== 'conflict') {
      trouble = { kind: error.kind }
      schedule(retry_ms)
      retry_ms = Math.min(longestRetry_ms, retry_ms * 2)
    }
    options.onState(state())
  }

  async function refresh(): Promise<void> {
    if (sending || running || conflict || closed) return
    const before = base
    let pulled: Pulled
    try {
      pulled = await options.pull()
    } catch (error) {
      if (error instanceof SaveFailure) return
      throw error
    }
    if (sending || closed || base !== before || pulled.revision <= base) return
    base = pulled.revision
    baseDocument = pulled.document
    showRebased()
    changed()
  }

  async function settle(document: BuildDocument, edits: readonly Edit[]): Promise<void> {
    if (!conflict) return
    base = conflict.revision
    baseDocument = document
    sending = null
    conflict = null
    waiting = [...edits]
    showRebased()
    changed()
    await flush()
  }

  async function discard(): Promise<void> {
    cancelTimer()
    const pulled = await options.pull()
    base = pulled.revision
    baseDocument = pulled.document
    sending = null
    waiting = []
    conflict = null
    trouble = null
    options.onDocument(baseDocument, [])
    changed()
  }

  options.onState(state())
  if (unsaved() > 0) schedule(0)
  return {
    add,
    flush,
    refresh,
    settle,
    discard,
    state,
    unsaved,
    pending: () => [...(sending?.edits ?? []), ...waiting],
    close() {
      closed = true
      cancelTimer()
    },
  }
}
