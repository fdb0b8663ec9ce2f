import { apply, ChangeError } from '#shared/build/apply.ts'
import type { Change, Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { invert } from '#shared/build/invert.ts'

interface Step {
  label: string
  changes: Change[]
  /** Edits of one gesture, as typing in one field, become one step. */
  gesture?: string
}

/** What can be undone and redone, newest last. Plain data: every move gives a new one. */
export interface History {
  back: readonly Step[]
  forth: readonly Step[]
}

export const emptyHistory: History = { back: [], forth: [] }

export interface Moved {
  document: BuildDocument
  history: History
  /** The edit to save. */
  edit: Edit
}

/** Applies an edit and remembers the way back. Edits of the same gesture are undone together. */
export function perform(document: BuildDocument, history: History, edit: Edit, gesture?: string): Moved {
  const next = apply(document, edit.changes)
  const way = invert(document, edit.changes)
  const last = history.back.at(-1)
  const joined = gesture !== undefined && last?.gesture === gesture && history.forth.length === 0
  const step: Step = {
    label: edit.label,
    changes: joined ? [...way, ...last.changes] : way,
    ...(gesture !== undefined && { gesture }),
  }
  const back = joined ? history.back.slice(0, -1) : history.back
  return { document: next, history: { back: [...back, step], forth: [] }, edit }
}

/** Why a step cannot be taken: its subject was changed by somebody else. The step is dropped. */
export interface Stuck {
  history: History
  reason: string
}

export const undo = (document: BuildDocument, history: History) => travel(document, history, 'back')
export const redo = (document: BuildDocument, history: History) => travel(document, history, 'forth')

function travel(document: BuildDocument, history: History, way: 'back' | 'forth'): Moved | Stuck | null {
  const step = history[way].at(-1)
  if (!step) return null
  const other = way === 'back' ? 'forth' : 'back'
  const shorter = history[way].slice(0, -1)
  try {
    const next = apply(document, step.changes)
    const opposite: Step = { label: step.label, changes: invert(document, step.changes) }
    const moved = { [way]: shorter, [other]: [...history[other], opposite] } as unknown as History
    return {
      document: next,
      history: moved,
      edit: { label: `${way === 'back' ? 'Undo' : 'Redo'}: ${step.label}`.slice(0, 200), changes: step.changes },
    }
  } catch (error) {
    if (!(error instanceof ChangeError)) throw error
    const verb = way === 'back' ? 'undone' : 'redone'
    return {
      history: { ...history, [way]: shorter },
      reason: `"${step.label}" can no longer be ${verb}: somebody else changed it (${error.message}).`,
    }
  }
}
