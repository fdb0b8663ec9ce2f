import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { rebase } from '#shared/build/edits/rebase.ts'
import { documentOf, looseParts } from './smallShop.ts'

describe('rebase', () => {
  const mine = documentOf(looseParts)

  it('keeps edits that touch other things', () => {
    const theirs = apply(mine, [{ op: 'updatePart', id: 'c2', patch: { serial: 'X' } }])
    const edit = { label: 'note', changes: [{ op: 'updatePart' as const, id: 'c1', patch: { note: 'hello' } }] }
    const { document, edits, dropped } = rebase(theirs, [edit])
    expect(document.parts.find((part) => part.id === 'c1')?.note).toBe('hello')
    expect(document.parts.find((part) => part.id === 'c2')?.serial).toBe('X')
    expect(edits).toEqual([edit])
    expect(dropped).toEqual([])
  })

  it('gives the next designation when the other person took the same', () => {
    const theirs = apply(mine, [{ op: 'addPart', part: { id: 'their', model: 'lead-4', ref: 'W3' } }])
    const { document, edits } = rebase(theirs, [
      { label: 'Add W3', changes: [{ op: 'addPart', part: { id: 'own', model: 'lead-4', ref: 'W3' } }] },
    ])
    expect(document.parts.slice(-2).map((part) => part.ref)).toEqual(['W3', 'W4'])
    expect(edits[0]?.changes[0]).toMatchObject({ part: { ref: 'W4' } })
  })

  it('drops and reports only what lost its subject', () => {
    const theirs = apply(mine, [{ op: 'removePart', id: 'c1' }])
    const { document, edits, dropped } = rebase(theirs, [
      {
        label: 'Serials',
        changes: [
          { op: 'updatePart', id: 'c1', patch: { serial: 'A' } },
          { op: 'updatePart', id: 'c2', patch: { serial: 'B' } },
        ],
      },
    ])
    expect(document.parts.find((part) => part.id === 'c2')?.serial).toBe('B')
    expect(edits[0]?.changes).toHaveLength(1)
    expect(dropped).toEqual([
      { edit: 'Serials', change: expect.objectContaining({ id: 'c1' }) as unknown, reason: 'no part "c1"' },
    ])
  })
})
