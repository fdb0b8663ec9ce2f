import type { Change, Edit } from '../changes.ts'

/** Makes an id that no document has yet. Passed in, so that building an edit stays a pure function. */
export type MakeId = (prefix: 'p' | 'j') => string

/** What a gesture comes to: an edit to apply, or the reason why not, in words for the person. */
export type EditOutcome = { ok: true; edit: Edit; notes: readonly string[] } | { ok: false; reason: string }

export const refuse = (reason: string): EditOutcome => ({ ok: false, reason })

/** An edit from changes; refused where there is nothing to change. */
export function outcome(label: string, changes: Change[], notes: readonly string[] = []): EditOutcome {
  if (changes.length === 0) return refuse(notes[0] ?? 'Nothing would change.')
  return { ok: true, edit: { label: label.slice(0, 200), changes }, notes }
}
