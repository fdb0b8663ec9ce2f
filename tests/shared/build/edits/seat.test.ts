import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { connect } from '#shared/build/edits/connect.ts'
import { leaveBay, moveToBay } from '#shared/build/edits/seat.ts'
import { buildOf, countingIds, looseParts, smallCatalog } from './smallShop.ts'
import { resolve } from '#shared/build/resolve.ts'

const withPlane = buildOf({
  parts: [
    { id: 'a', model: 'box', ref: 'A1' },
    { id: 'u', model: 'plane-4', ref: 'U1', bay: { case: 'a', slot: 1 } },
    { id: 'c1', model: 'disk-35', ref: 'C1', bay: { case: 'a', slot: 1 } },
    { id: 'c2', model: 'disk-35', ref: 'C2', bay: { case: 'a', slot: 6 } },
  ],
  joints: [{ id: 'j1', a: { part: 'u', connector: 'bay-1' }, b: { part: 'c1', connector: 'plug' } }],
})

describe('moveToBay', () => {
  it('moves a drive and seats it behind the new bay', () => {
    const made = moveToBay(withPlane, countingIds(), 'c1', { case: 'a', slot: 3 })
    if (!made.ok) throw new Error(made.reason)
    const document = apply(withPlane.document, made.edit.changes)
    expect(made.edit.label).toBe('Move C1 to bay 3')
    expect(document.joints.map((joint) => joint.a.connector)).toEqual(['bay-3'])
  })

  it('swaps two drives, seating the one that comes in and unseating the one that goes out', () => {
    const made = moveToBay(withPlane, countingIds(), 'c2', { case: 'a', slot: 1 })
    if (!made.ok) throw new Error(made.reason)
    const document = apply(withPlane.document, made.edit.changes)
    expect(made.edit.label).toBe('Swap C2 and C1')
    expect(document.parts.map((part) => part.bay?.slot)).toEqual([undefined, 1, 6, 1])
    expect(document.joints.map((joint) => [joint.a.connector, joint.b.part])).toEqual([['bay-1', 'c2']])
  })

  it('leaves the cables on a drive that has some', () => {
    const loose = buildOf(looseParts)
    const joined = connect(loose, countingIds(), { part: 'w', connector: 'out-1' }, { part: 'c1', connector: 'plug' })
    if (!joined.ok) throw new Error(joined.reason)
    const build = resolve(apply(loose.document, joined.edit.changes), smallCatalog)
    const made = moveToBay(build, countingIds(), 'c1', { case: 'a', slot: 5 })
    expect(made.ok && made.edit.changes.map((change) => change.op)).toEqual(['updatePart'])
  })

  it('refuses a bay of another size, with both sizes', () => {
    const made = moveToBay(withPlane, countingIds(), 'c1', { case: 'a', slot: 7 })
    expect(made).toEqual({ ok: false, reason: 'Bay 7 takes 2.5 in drives; C1 is 3.5 in.' })
  })

  it('takes a drive out of its bay and off its backplane', () => {
    const made = leaveBay(withPlane, 'c1')
    if (!made.ok) throw new Error(made.reason)
    const document = apply(withPlane.document, made.edit.changes)
    expect(document.joints).toEqual([])
    expect(document.parts.find((part) => part.id === 'c1')?.bay).toBeUndefined()
  })
})
