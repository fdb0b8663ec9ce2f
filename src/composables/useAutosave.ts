import { useEventListener } from '@vueuse/core'
import { onScopeDispose, shallowRef, watch } from 'vue'
import { buildDocumentSchema, type BuildDocument } from '#shared/build/document.ts'
import { rebase, type DroppedChange } from '#shared/build/edits/rebase.ts'
import { openBuild, saveBuild, type OpenBuild } from '../api/builds.ts'
import { NetworkError } from '../api/errors.ts'
import { useDiagramStore } from '../stores/diagram.ts'
import type { Draft } from '../stores/save/draft.ts'
import { SaveFailure } from '../stores/save/failure.ts'
import { createIdbDrafts } from '../stores/save/idbDrafts.ts'
import { createSaver, type Pulled, type Saver } from '../stores/save/saver.ts'
import { describeClashes, settleEdits, type Clash, type Side } from '../stores/save/settle.ts'
import type { SaveState } from '../stores/save/state.ts'
import { claimTab, draftKey, isAbandoned, tabOf } from '../stores/save/tabs.ts'
import { asSave } from '../stores/save/toFailure.ts'
import { useSessionStore } from '../stores/session.ts'

/** What the page needs to show a build: the document, unsaved work already on top, and who may do what. */
export interface Opened {
  document: BuildDocument
  /** Null where the server does not answer and only this computer's copy is there. */
  summary: OpenBuild | null
}

const readDocument = (document: unknown): BuildDocument => buildDocumentSchema.parse(document)

async function pullBuild(buildId: string): Promise<Pulled> {
  const opened = await asSave(openBuild(buildId))
  return { revision: opened.revision, document: readDocument(opened.document) }
}

/** Opens a build and from then on saves every edit, keeps what is not saved yet on this computer, and settles conflicts. */
export function useAutosave(buildId: string) {
  const diagram = useDiagramStore()
  const session = useSessionStore()
  const drafts = createIdbDrafts()
  const channel = new BroadcastChannel(`bayloom-build-${buildId}`)
  const state = shallowRef<SaveState | null>(null)
  const clashes = shallowRef<readonly Clash[]>([])
  let saver: Saver | null = null
  let theirs: BuildDocument | null = null
  /** What to say of a change that one made on the server oneself, in place of "somebody else". */
  let ownWords: string | null = null
  let closed = false
  /** Newest revision that is known to exist, and who saved it. */
  let newest = { revision: 0, by: null as string | null }

  async function open(): Promise<Opened> {
    const tab = await claimTab()
    const [left, summary] = await Promise.all([findDrafts(tab), openOrNull()])
    const key = draftKey(tab, buildId)
    const mine = left.find((draft) => draft.key === key) ?? left[0]
    if (!mine && !summary) throw new NetworkError(undefined)
    const draft = mine ? { ...mine, key } : draftOf(key, summary as OpenBuild)
    if (mine && mine.key !== key) {
      await drafts.put(draft)
      await drafts.remove(mine.key)
    }
    const { document } = rebase(draft.baseDocument, [...(draft.sending?.edits ?? []), ...draft.waiting])
    if (!closed)
      begin(
        draft,
        left.filter((one) => one !== mine),
      )
    return { document, summary }
  }

  async function openOrNull(): Promise<OpenBuild | null> {
    try {
      return await openBuild(buildId)
    } catch (error) {
      if (error instanceof NetworkError) return null
      throw error
    }
  }

  const draftOf = (key: string, summary: OpenBuild): Draft => ({
    key,
    buildId,
    base: summary.revision,
    baseDocument: readDocument(summary.document),
    sending: null,
    waiting: [],
    savedAt: Date.now(),
  })

  /** Drafts of this tab and of tabs that are gone, newest first. */
  async function findDrafts(tab: string): Promise<Draft[]> {
    const all = await drafts.list(buildId)
    const free = await Promise.all(all.map((draft) => tabOf(draft.key) === tab || isAbandoned(tabOf(draft.key))))
    return all.filter((_, i) => free[i])
  }

  function makeSaver(
    draft: Draft,
    more: Pick<Parameters<typeof createSaver>[0], 'onState' | 'onDocument' | 'onSaved'>,
  ) {
    return createSaver({
      draft,
      send: (request) => asSave(saveBuild(buildId, request)),
      pull: () => pullBuild(buildId),
      drafts,
      makeRequestId: () => crypto.randomUUID(),
      now: () => Date.now(),
      later: (run, ms) => {
        const timer = setTimeout(run, ms)
        return () => clearTimeout(timer)
      },
      ...more,
    })
  }

  function begin(draft: Draft, orphans: readonly Draft[]): void {
    saver = makeSaver(draft, {
      onState: showState,
      onDocument: (document, dropped) => {
        diagram.replace(document)
        tellDropped(dropped)
      },
      onSaved: () => channel.postMessage('saved'),
    })
    void saveOrphans(orphans)
  }

  /** Work that other, closed tabs left behind goes the same way as one's own, one tab after the other. */
  async function saveOrphans(orphans: readonly Draft[]): Promise<void> {
    for (const orphan of orphans) {
      const helper = makeSaver(orphan, { onState: () => {}, onDocument: () => {} })
      await helper.flush()
      helper.close()
      if (helper.unsaved() > 0)
        diagram.say('A tab that was closed left changes that clash with this build. They are kept on this computer.')
    }
    if (orphans.length > 0) await saver?.refresh()
  }

  /** Somebody saved: their work comes in at once, or as soon as one's own is on its way no more. */
  function see(revision: number, by: string | null): void {
    if (revision > newest.revision) newest = { revision, by }
    lookForNewer()
  }

  function lookForNewer(): void {
    if (state.value && newest.revision > state.value.revision) takeIn()
  }

  /**
   * Others' work comes in. Where there is work of one's own, that goes to the server first: there it is merged with theirs
   * or found to clash. Put on top here, it would pass over theirs without a word.
   */
  function takeIn(): void {
    void (saver && saver.unsaved() > 0 ? saver.flush() : saver?.refresh())
  }

  function showState(next: SaveState): void {
    state.value = next
    if (next.kind === 'saved') queueMicrotask(lookForNewer)
    if (next.kind !== 'conflict') {
      clashes.value = []
      theirs = null
      return
    }
    const mine = diagram.document
    const parsed = buildDocumentSchema.safeParse(next.conflict.document)
    if (!mine || !parsed.success) return
    theirs = parsed.data
    clashes.value = describeClashes(next.conflict.clashes, mine, parsed.data)
    if (clashes.value.length === 0 && next.conflict.clashes.length > 0) void settle(new Map())
  }

  async function settle(choices: ReadonlyMap<string, Side>): Promise<void> {
    const mine = diagram.document
    if (!saver || !mine || !theirs) return
    await saver.settle(theirs, settleEdits(theirs, mine, saver.pending(), choices))
  }

  /**
   * Carries out what changes the build on the server beside the edits, as restoring a revision: what waits is sent first,
   * and the result comes in as one's own work, which can be undone.
   */
  async function carryOut(words: string, act: (base: number) => Promise<unknown>): Promise<void> {
    await saver?.flush()
    if (!saver || saver.unsaved() > 0 || !diagram.document)
      throw new Error('Some of your changes are not saved yet. Try again when they are.')
    const before = diagram.document
    ownWords = words
    try {
      await act(saver.state().revision)
      await saver.refresh()
      diagram.remember(words, before)
      channel.postMessage('saved')
    } finally {
      ownWords = null
    }
  }

  function tellDropped(dropped: readonly DroppedChange[]): void {
    const [first] = dropped
    if (ownWords !== null && !first) return diagram.say(`${ownWords}.`)
    const who = newest.by ?? 'Somebody else'
    if (first) diagram.say(`${who} changed this build. "${first.edit}" no longer fits (${first.reason}).`, 'refusal')
    else diagram.say(`${who} changed this build: their changes are in.`)
  }

  const stopEdits = diagram.onEdit((edit) => saver?.add(edit))
  channel.onmessage = takeIn
  useEventListener(window, 'online', () => void saver?.flush())
  useEventListener(document, 'visibilitychange', () => {
    if (document.visibilityState === 'hidden') void saver?.flush()
    else if (saver?.unsaved() === 0) void saver.refresh()
  })
  watch(
    () => session.hasEnded,
    (ended) => {
      if (!ended) void saver?.flush()
    },
  )

  onScopeDispose(() => {
    closed = true
    stopEdits()
    channel.close()
    const leaving = saver
    saver = null
    void leaving?.flush().finally(() => leaving.close())
  })

  return {
    state,
    clashes,
    open,
    settle,
    see,
    carryOut,
    retry: () => saver?.flush(),
    discard: async () => {
      try {
        await saver?.discard()
      } catch (error) {
        if (!(error instanceof SaveFailure)) throw error
        diagram.say('The server does not answer: nothing was given up.', 'refusal')
      }
    },
  }
}
