import { apply, ChangeError } from '#shared/build/apply.ts'
import type { Change, Edit } from '#shared/build/changes.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { invert } from '#shared/build/invert.ts'
import { same } from '#shared/build/same.ts'

interface Step {
  label: string
  changes: Change[]
  /** The way back from `changes`, as things stood when the step was made: other than now where others came since. */
  opposite: Change[]
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
  const changes = joined ? [...way, ...last.changes] : way
  const step: Step = {
    label: edit.label,
    changes,
    opposite: invert(next, changes),
    ...(gesture !== undefined && { gesture }),
  }
  const back = joined ? history.back.slice(0, -1) : history.back
  return { document: next, history: { back: [...back, step], forth: [] }, edit }
}

/**
 * Why a step cannot be taken: somebody else changed its subject since, and going back would undo their work with one's
 * own. The step is dropped.
 */
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
    const changes = invert(document, step.changes)
    if (!same(changes, step.opposite)) return stuck(step, history, way, 'it is no longer as you left it')
    const back: Step = { label: step.label, changes, opposite: invert(next, changes) }
    const moved = { [way]: shorter, [other]: [...history[other], back] } as unknown as History
    return {
      document: next,
      history: moved,
      edit: { label: `${way === 'back' ? 'Undo' : 'Redo'}: ${step.label}`.slice(0, 200), changes: step.changes },
    }
  } catch (error) {
    if (!(error instanceof ChangeError)) throw error
    return stuck(step, history, way, error.message)
  }
}

function stuck(step: Step, history: History, way: 'back' | 'forth', why: string): Stuck {
  const verb = way === 'back' ? 'undone' : 'redone'
  return {
    history: { ...history, [way]: history[way].slice(0, -1) },
    reason: `"${step.label}" can no longer be ${verb}: somebody else changed it (${why}).`,
  }
}
