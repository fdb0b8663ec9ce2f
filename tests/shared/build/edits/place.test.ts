import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { addParts } from '#shared/build/edits/place.ts'
import { buildOf, countingIds, looseParts, smallCatalog } from './smallShop.ts'

const add = (input: Parameters<typeof buildOf>[0], ...rest: [string, Parameters<typeof addParts>[3]?]) => {
  const build = buildOf(input)
  const made = addParts(build, countingIds(), ...rest)
  if (!made.ok) throw new Error(made.reason)
  return { ...made, document: apply(build.document, made.edit.changes) }
}

describe('addParts', () => {
  it('puts N drives in the next free bays and gives new designations', () => {
    const { document, edit, notes } = add(looseParts, 'disk-35', { count: 3 })
    const added = document.parts.slice(7)
    expect(added.map((part) => [part.ref, part.bay?.slot])).toEqual([
      ['C4', 4],
      ['C5', 5],
      ['C6', 6],
    ])
    expect(edit.label).toBe('Add C4, C5 and C6 in bays 4 to 6')
    expect(notes).toEqual([])
  })

  it('passes over bays of another size', () => {
    const { document } = add(looseParts, 'disk-25', { count: 2 })
    expect(document.parts.slice(7).map((part) => part.bay?.slot)).toEqual([7, 8])
  })

  it('says which drives found no bay', () => {
    const { document, notes } = add(looseParts, 'disk-35', { count: 5 })
    expect(document.parts.filter((part) => part.model === 'disk-35' && !part.bay).map((part) => part.ref)).toEqual([
      'C7',
      'C8',
    ])
    expect(notes).toEqual(['No bay left for C7 and C8: they stand beside the case.'])
  })

  it('starts at the bay that was dropped on', () => {
    const { document } = add(looseParts, 'disk-35', { count: 1, from: { case: 'a', slot: 5 } })
    expect(document.parts.at(-1)?.bay).toEqual({ case: 'a', slot: 5 })
  })

  it('seats a drive where a backplane stands behind the bay', () => {
    const { document } = add(
      {
        parts: [
          { id: 'a', model: 'box', ref: 'A1' },
          { id: 'u', model: 'plane-4', ref: 'U1', bay: { case: 'a', slot: 3 } },
        ],
      },
      'disk-35',
      { from: { case: 'a', slot: 4 } },
    )
    expect(document.joints.map((joint) => [joint.a.connector, joint.b.part])).toEqual([['bay-2', 'p-n1']])
  })

  it('gives a second backplane the bays that none serves yet', () => {
    const { document } = add(
      {
        parts: [
          { id: 'a', model: 'box', ref: 'A1' },
          { id: 'u', model: 'plane-4', ref: 'U1', bay: { case: 'a', slot: 1 } },
        ],
      },
      'plane-4',
    )
    expect(document.parts.at(-1)?.bay).toEqual({ case: 'a', slot: 5 })
  })

  it('never gives a number twice, not even one that was skipped', () => {
    const { document } = add({ parts: [{ id: 'w', model: 'lead-4', ref: 'W7' }] }, 'splitter-2', { count: 2 })
    expect(document.parts.map((part) => part.ref)).toEqual(['W7', 'W8', 'W9'])
  })

  it("brings a model of one's own library into the document, once", () => {
    const build = buildOf()
    const model = smallCatalog.models.get('splitter-2')
    if (!model) throw new Error('no splitter')
    const made = addParts(build, countingIds(), { ...model, id: 'own-splitter' }, { count: 2 })
    if (!made.ok) throw new Error(made.reason)
    const document = apply(build.document, made.edit.changes)
    expect(document.models.map((one) => one.id)).toEqual(['own-splitter'])
    expect(document.parts.map((part) => part.model)).toEqual(['own-splitter', 'own-splitter'])
  })

  it('refuses a model that is gone', () => {
    expect(addParts(buildOf(), countingIds(), 'nothing')).toEqual({
      ok: false,
      reason: 'This model is no longer in the catalog.',
    })
  })
})
