import { apply, ChangeError } from '../apply.ts'
import type { Change, Edit } from '../changes.ts'
import type { BuildDocument } from '../document.ts'

/** A change that no longer fits, because somebody else changed what it was about. */
export interface DroppedChange {
  edit: string
  change: Change
  reason: string
}

export interface Rebased {
  document: BuildDocument
  /** The edits that still apply, without what was dropped. */
  edits: Edit[]
  dropped: DroppedChange[]
}

/**
 * Puts edits on top of another state of the document. What fits is kept; a designation that was meanwhile given to
 * another part moves on to the next free number; a change whose subject is gone is dropped and reported.
 */
export function rebase(document: BuildDocument, edits: readonly Edit[]): Rebased {
  let current = document
  const kept: Edit[] = []
  const dropped: DroppedChange[] = []
  for (const edit of edits) {
    const whole = tryApply(current, freshRefs(current, edit.changes))
    if (whole.ok) {
      current = whole.document
      kept.push({ ...edit, changes: whole.changes })
      continue
    }
    const changes: Change[] = []
    for (const change of edit.changes) {
      const one = tryApply(current, freshRefs(current, [change]))
      if (one.ok) {
        current = one.document
        changes.push(...one.changes)
      } else dropped.push({ edit: edit.label, change, reason: one.reason })
    }
    if (changes.length > 0) kept.push({ ...edit, changes })
  }
  return { document: current, edits: kept, dropped }
}

type Tried = { ok: true; document: BuildDocument; changes: Change[] } | { ok: false; reason: string }

function tryApply(document: BuildDocument, changes: Change[]): Tried {
  try {
    return { ok: true, document: apply(document, changes), changes }
  } catch (error) {
    if (error instanceof ChangeError) return { ok: false, reason: error.message }
    throw error
  }
}

function freshRefs(document: BuildDocument, changes: readonly Change[]): Change[] {
  if (!changes.some((change) => change.op === 'addPart')) return [...changes]
  const taken = new Set(document.parts.map((part) => part.ref))
  return changes.map((change) => {
    if (change.op !== 'addPart') return change
    const ref = taken.has(change.part.ref) ? nextOf(change.part.ref, taken) : change.part.ref
    taken.add(ref)
    return ref === change.part.ref ? change : { ...change, part: { ...change.part, ref } }
  })
}

/** One past the highest number given under the same letter. */
function nextOf(ref: string, taken: ReadonlySet<string>): string {
  const letter = ref.replace(/\d+$/, '')
  let highest = 0
  for (const other of taken)
    if (other.replace(/\d+$/, '') === letter) highest = Math.max(highest, Number(other.slice(letter.length)))
  return `${letter}${highest + 1}`
}
