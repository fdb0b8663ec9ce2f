import { defineStore } from 'pinia'
import { computed, ref, shallowRef } from 'vue'
import { changesBetween } from '#shared/build/changesBetween.ts'
import type { Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import type { EditOutcome } from '#shared/build/edits/outcome.ts'
import { invert } from '#shared/build/invert.ts'
import { resolve } from '#shared/build/resolve.ts'
import type { CatalogIndex } from '#shared/catalog/catalog.ts'
import { arrange } from '#shared/layout/arrange.ts'
import type { Drawing } from '#shared/layout/drawing.ts'
import { looksAlike } from '../diagram/looksAlike.ts'
import { makeId } from '../diagram/makeId.ts'
import { emptyHistory, perform, redo as stepForth, undo as stepBack, type History } from './history.ts'

/** Quiet words are for screen readers alone. */
type Tone = 'note' | 'refusal' | 'quiet'
type Listener = (edit: Edit, before: BuildDocument, after: BuildDocument) => void

/**
 * The open document and its history. The document is replaced, never changed in place; an edit is the only way to
 * another one, and whoever shows it (canvas, tables, inspector) reads it from here.
 */
export const useDiagramStore = defineStore('diagram', () => {
  const buildId = ref<string | null>(null)
  const canEdit = ref(false)
  const document = shallowRef<BuildDocument | null>(null)
  const catalog = shallowRef<CatalogIndex | null>(null)
  const history = shallowRef<History>(emptyHistory)
  /** What the last gesture had to say, for the bar and for screen readers. */
  const notice = shallowRef<{ text: string; tone: Tone; at: number } | null>(null)
  const listeners = new Set<Listener>()
  let noticed = 0

  const build = computed(() => (document.value && catalog.value ? resolve(document.value, catalog.value) : null))
  /** Arranged again only where an edit touches what the arrangement depends on. */
  let arranged: { document: BuildDocument; drawing: Drawing } | null = null
  const drawing = computed(() => {
    if (!build.value) return null
    const { document: now } = build.value
    if (!arranged || !looksAlike(arranged.document, now)) arranged = { document: now, drawing: arrange(build.value) }
    else arranged = { ...arranged, document: now }
    return arranged.drawing
  })
  const undoLabel = computed(() => history.value.back.at(-1)?.label ?? null)
  const redoLabel = computed(() => history.value.forth.at(-1)?.label ?? null)

  function open(id: string, opened: BuildDocument, index: CatalogIndex, editable: boolean): void {
    buildId.value = id
    canEdit.value = editable
    arranged = null
    catalog.value = index
    document.value = opened
    history.value = emptyHistory
    notice.value = null
  }

  function close(): void {
    buildId.value = null
    document.value = null
    history.value = emptyHistory
  }

  function say(text: string, tone: Tone = 'note'): void {
    notice.value = { text, tone, at: ++noticed }
  }

  /** Carries out what a gesture came to, or says why it came to nothing. True where the document changed. */
  function commit(made: EditOutcome, gesture?: string): boolean {
    if (!made.ok) {
      say(made.reason, 'refusal')
      return false
    }
    if (!document.value || !canEdit.value) {
      say('You can look at this build, but not change it.', 'refusal')
      return false
    }
    const before = document.value
    const moved = perform(before, history.value, made.edit, gesture)
    document.value = moved.document
    history.value = moved.history
    for (const listener of listeners) listener(moved.edit, before, moved.document)
    say([`${made.edit.label}.`, ...made.notes].join(' '))
    return true
  }

  function travel(step: typeof stepBack): void {
    if (!document.value || !canEdit.value) return
    const before = document.value
    const moved = step(before, history.value)
    if (!moved) return
    history.value = moved.history
    if (!('document' in moved)) {
      say(moved.reason, 'refusal')
      return
    }
    document.value = moved.document
    for (const listener of listeners) listener(moved.edit, before, moved.document)
    say(`${moved.edit.label}.`)
  }

  /** Others' work came in beneath: the document changes without an edit of one's own. */
  function replace(next: BuildDocument): void {
    document.value = next
  }

  /** Makes what was done on the server a step that can be undone: the way back to the document before. */
  function remember(label: string, before: BuildDocument): void {
    if (!document.value) return
    const changes = changesBetween(document.value, before)
    if (changes.length === 0) return
    const step = { label, changes, opposite: invert(document.value, changes) }
    history.value = { back: [...history.value.back, step], forth: [] }
  }

  function onEdit(listener: Listener): () => void {
    listeners.add(listener)
    return () => listeners.delete(listener)
  }

  return {
    buildId,
    canEdit,
    document,
    catalog,
    build,
    drawing,
    history,
    notice,
    undoLabel,
    redoLabel,
    makeId,
    open,
    close,
    say,
    commit,
    undo: () => travel(stepBack),
    redo: () => travel(stepForth),
    replace,
    remember,
    onEdit,
  }
})
