import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import type { Edit } from '#shared/build/changes.ts'
import { emptyHistory, perform, redo, undo } from '../../../src/stores/history.ts'
import { documentOf, looseParts } from '../../shared/build/edits/smallShop.ts'

const first = documentOf(looseParts)
const note = (id: string, text: string): Edit => ({
  label: `Note on ${id}`,
  changes: [{ op: 'updatePart', id, patch: { note: text } }],
})

describe('history', () => {
  it('goes all the way back and forth again', () => {
    let document = first
    let history = emptyHistory
    for (let i = 0; i < 300; i++) ({ document, history } = perform(document, history, note('c1', `n${i}`)))
    const last = document
    for (let i = 0; i < 300; i++) {
      const moved = undo(document, history)
      if (!moved || !('document' in moved)) throw new Error('stuck')
      ;({ document, history } = moved)
    }
    expect(document).toEqual(first)
    expect(undo(document, history)).toBeNull()
    for (let i = 0; i < 300; i++) {
      const moved = redo(document, history)
      if (!moved || !('document' in moved)) throw new Error('stuck')
      ;({ document, history } = moved)
    }
    expect(document).toEqual(last)
  })

  it('names what it undoes and redoes', () => {
    const done = perform(first, emptyHistory, note('c1', 'x'))
    const back = undo(done.document, done.history)
    expect(back && 'edit' in back && back.edit.label).toBe('Undo: Note on c1')
    if (!back || !('document' in back)) throw new Error('stuck')
    const forth = redo(back.document, back.history)
    expect(forth && 'edit' in forth && forth.edit.label).toBe('Redo: Note on c1')
  })

  it('undoes one gesture as one step, and a new gesture on its own', () => {
    let moved = perform(first, emptyHistory, note('c1', 'h'), 'typing-1')
    moved = perform(moved.document, moved.history, note('c1', 'hello'), 'typing-1')
    moved = perform(moved.document, moved.history, note('c1', 'bye'), 'typing-2')
    expect(moved.history.back).toHaveLength(2)
    let document = moved.document
    let history = moved.history
    for (let i = 0; i < 2; i++) {
      const back = undo(document, history)
      if (!back || !('document' in back)) throw new Error('stuck')
      ;({ document, history } = back)
    }
    expect(document).toEqual(first)
  })

  it('forgets what was undone once something new is done', () => {
    const done = perform(first, emptyHistory, note('c1', 'x'))
    const back = undo(done.document, done.history)
    if (!back || !('document' in back)) throw new Error('stuck')
    const fresh = perform(back.document, back.history, note('c2', 'y'))
    expect(redo(fresh.document, fresh.history)).toBeNull()
  })

  it('says so and goes on when somebody else removed the subject', () => {
    const done = perform(first, emptyHistory, note('c1', 'x'))
    const theirs = apply(done.document, [{ op: 'removePart', id: 'c1' }])
    const back = undo(theirs, done.history)
    expect(back).toEqual({
      history: emptyHistory,
      reason: '"Note on c1" can no longer be undone: somebody else changed it (no part "c1").',
    })
  })

  describe('with somebody else at work in the same build', () => {
    const theirs: Edit = { label: 'Theirs', changes: [{ op: 'updatePart', id: 'c2', patch: { note: 'theirs' } }] }
    const noteOf = (document: typeof first, id: string) => document.parts.find((part) => part.id === id)?.note

    it("undoes and redoes one's own edits and leaves theirs alone", () => {
      const mine = perform(first, emptyHistory, note('c1', 'mine'))
      const merged = apply(mine.document, theirs.changes)
      const back = undo(merged, mine.history)
      if (!back || !('document' in back)) throw new Error('stuck')
      expect([noteOf(back.document, 'c1'), noteOf(back.document, 'c2')]).toEqual([undefined, 'theirs'])
      expect(back.edit.changes.every((change) => 'id' in change && change.id === 'c1')).toBe(true)
      const forth = redo(back.document, back.history)
      if (!forth || !('document' in forth)) throw new Error('stuck')
      expect([noteOf(forth.document, 'c1'), noteOf(forth.document, 'c2')]).toEqual(['mine', 'theirs'])
    })

    it('another field of the same part stays theirs', () => {
      const mine = perform(first, emptyHistory, note('c1', 'mine'))
      const merged = apply(mine.document, [{ op: 'updatePart', id: 'c1', patch: { serial: 'THEIRS' } }])
      const back = undo(merged, mine.history)
      if (!back || !('document' in back)) throw new Error('stuck')
      expect(back.document.parts.find((part) => part.id === 'c1')).toMatchObject({ serial: 'THEIRS' })
      expect(noteOf(back.document, 'c1')).toBeUndefined()
    })

    it('does not undo what they made of it since, and goes on with the step before', () => {
      let mine = perform(first, emptyHistory, note('c2', 'early'))
      mine = perform(mine.document, mine.history, note('c1', 'mine'))
      const merged = apply(mine.document, note('c1', 'theirs, later').changes)
      const back = undo(merged, mine.history)
      if (!back || 'document' in back) throw new Error('their work was undone')
      expect(back.reason).toBe(
        '"Note on c1" can no longer be undone: somebody else changed it (it is no longer as you left it).',
      )
      const before = undo(merged, back.history)
      if (!before || !('document' in before)) throw new Error('stuck')
      expect([noteOf(before.document, 'c1'), noteOf(before.document, 'c2')]).toEqual(['theirs, later', undefined])
    })

    it('does not take away a part that they have changed since it was added', () => {
      const part = { id: 'n1', model: 'lead-4', ref: 'W9' } as const
      const mine = perform(first, emptyHistory, { label: 'Add W9', changes: [{ op: 'addPart', part }] })
      const untouched = undo(mine.document, mine.history)
      expect(untouched && 'document' in untouched).toBe(true)
      const merged = apply(mine.document, note('n1', 'theirs').changes)
      const back = undo(merged, mine.history)
      expect(back && 'reason' in back).toBe(true)
    })
  })
})
