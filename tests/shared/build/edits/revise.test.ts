import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { moveParts, overrideFigure, patchPart, renameRef } from '#shared/build/edits/revise.ts'
import type { EditOutcome } from '#shared/build/edits/outcome.ts'
import { documentOf, looseParts } from './smallShop.ts'

const document = documentOf(looseParts)
const done = (made: EditOutcome) => {
  if (!made.ok) throw new Error(made.reason)
  return apply(document, made.edit.changes)
}

describe('editing one part', () => {
  it('changes only what differs', () => {
    const made = patchPart(document, 'c1', { serial: 'SN-0001', role: 'parity' })
    expect(made.ok && made.edit).toEqual({
      label: 'Change role of C1',
      changes: [{ op: 'updatePart', id: 'c1', patch: { role: 'parity' } }],
    })
  })

  it('voids pin test and own figures when the model changes', () => {
    const made = patchPart(document, 'w', { model: 'splitter-2' })
    expect(made.ok && made.edit.changes).toEqual([
      { op: 'updatePart', id: 'w', patch: { pinTest: null, overrides: null, model: 'splitter-2' } },
    ])
  })

  it.each([
    ['w2', 'W2 is taken. Names on tape never stand for two parts.'],
    ['lead', '"lead" is no designation: use a class letter and a number, as "W6".'],
    ['W1', 'Nothing would change.'],
  ])('refuses the designation %s', (ref, reason) => {
    expect(renameRef(document, 'w', ref)).toEqual({ ok: false, reason })
  })

  it('writes a designation in capitals', () => {
    expect(done(renameRef(document, 'w', ' w12 ')).parts.find((part) => part.id === 'w')?.ref).toBe('W12')
  })

  it('sets and takes back an own figure', () => {
    const figure = { value: 1.9, origin: 'measured' as const, by: 'M. Invented', on: '2026-11-30' }
    const set = done(overrideFigure(document, 'c1', 'load.12V.start.peak_A', figure))
    expect(set.parts.find((part) => part.id === 'c1')?.overrides).toEqual({ 'load.12V.start.peak_A': figure })
    const back = overrideFigure(set, 'c1', 'load.12V.start.peak_A', null)
    if (!back.ok) throw new Error(back.reason)
    expect(apply(set, back.edit.changes).parts.find((part) => part.id === 'c1')?.overrides).toBeUndefined()
  })

  it('makes one edit of a drag and nothing of a drag that ends where it began', () => {
    const moved = moveParts(document, new Map([['w', { x: 8, y: 12 }]]))
    expect(moved.ok && moved.edit.label).toBe('Move W1')
    const after = done(moved)
    expect(moveParts(after, new Map([['w', { x: 8, y: 12 }]])).ok).toBe(false)
  })
})
