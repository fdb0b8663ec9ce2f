import type { ChangeMark, ToldChange } from '#shared/build/compareTold.ts'

/** What is lit on the sheet of one state, by part and by joint. */
export interface LitMarks {
  parts: ReadonlyMap<string, ChangeMark>
  joints: ReadonlyMap<string, ChangeMark>
}

/** Coming and going says more than moving, and moving more than a changed figure. */
const strength: Readonly<Record<ChangeMark, number>> = { added: 3, removed: 3, moved: 2, changed: 1 }

/** Marks of the older or the newer state. What was added is not there before, what was removed not after. */
export function litMarks(changes: readonly ToldChange[], state: 'before' | 'after'): LitMarks {
  const absent: ChangeMark = state === 'before' ? 'added' : 'removed'
  const parts = new Map<string, ChangeMark>()
  const joints = new Map<string, ChangeMark>()
  for (const { mark, parts: ids, joint } of changes) {
    if (mark === absent) continue
    for (const id of ids) if (strength[mark] > strengthOf(parts.get(id))) parts.set(id, mark)
    const id = joint?.[state]
    if (id) joints.set(id, mark)
  }
  return { parts, joints }
}

const strengthOf = (mark: ChangeMark | undefined): number => (mark === undefined ? 0 : strength[mark])
