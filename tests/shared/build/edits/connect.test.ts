import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { connect, removeJoints } from '#shared/build/edits/connect.ts'
import { connectPlanned, outletsForBays, planToBays, planToPart } from '#shared/build/edits/consecutive.ts'
import { freeMates } from '#shared/build/edits/mates.ts'
import { resolve, type ResolvedBuild } from '#shared/build/resolve.ts'
import { buildOf, countingIds, looseParts, smallCatalog } from './smallShop.ts'

const after = (build: ResolvedBuild, made: ReturnType<typeof connect>) => {
  if (!made.ok) throw new Error(made.reason)
  return resolve(apply(build.document, made.edit.changes), smallCatalog)
}
const part = (build: ResolvedBuild, id: string) => {
  const found = build.partById.get(id)
  if (!found) throw new Error(`no part ${id}`)
  return found
}
const end = (partId: string, connector: string) => ({ part: partId, connector })

describe('connect', () => {
  it('joins what mates and names both ends', () => {
    const made = connect(buildOf(looseParts), countingIds(), end('t', 'drive-1'), end('w', 'supply'))
    expect(made.ok && made.edit.label).toBe('Connect T1.1 to W1 supply')
  })

  it('says in words why two connectors cannot be joined', () => {
    const build = buildOf(looseParts)
    const reason = (a: [string, string], b: [string, string]) => {
      const made = connect(build, countingIds(), end(...a), end(...b))
      return made.ok ? '' : made.reason
    }
    expect(reason(['w', 'out-1'], ['w', 'out-2'])).toBe('Both ends are on W1.')
    expect(reason(['t', 'drive-1'], ['c1', 'plug'])).toContain('does not mate with')
    expect(reason(['t', 'drive-1'], ['gone', 'plug'])).toBe('One of the two connectors is no longer there.')
  })

  it('lets a drive take power and data from two sides, but neither twice', () => {
    let build = buildOf(looseParts)
    const makeId = countingIds()
    build = after(build, connect(build, makeId, end('w', 'out-1'), end('c1', 'plug')))
    build = after(build, connect(build, makeId, end('b', 'leg-1'), end('c1', 'plug')))
    const again = connect(build, makeId, end('w', 'out-2'), end('c1', 'plug'))
    expect(again).toEqual({ ok: false, reason: 'C1 already holds W1.1. Remove that joint first.' })
  })

  it('offers only free connectors that mate, nearest first', () => {
    let build = buildOf(looseParts)
    build = after(build, connect(build, countingIds(), end('w', 'out-1'), end('c2', 'plug')))
    const from = part(build, 'w').connectorById.get('out-2')
    if (!from) throw new Error('no outlet')
    const near: Record<string, number> = { C3: 1, C1: 2 }
    const refs = freeMates(build, from, (to) => near[to.part.part.ref] ?? 9).map((to) => to.part.part.ref)
    expect(refs).toEqual(['C3', 'C1'])
  })

  it('removes joints and says which', () => {
    const build = after(
      buildOf(looseParts),
      connect(buildOf(looseParts), countingIds(), end('w', 'out-1'), end('c1', 'plug')),
    )
    const made = removeJoints(build, ['j-n1'])
    expect(made.ok && made.edit).toEqual({
      label: 'Remove joint W1.1 to C1',
      changes: [{ op: 'removeJoint', id: 'j-n1' }],
    })
  })
})

describe('connecting outlets in a row', () => {
  it('pairs outlets with bays from the chosen one, in physical order', () => {
    const build = buildOf(looseParts)
    const plan = planToBays(build, part(build, 'w'), { case: 'a', slot: 2 })
    expect(plan.joints.map((joint) => [joint.from.connector.id, joint.slot])).toEqual([
      ['out-1', 2],
      ['out-2', 3],
    ])
    expect(plan.notes.at(-1)).toBe('2 outlets of W1 left without a bay.')
    const made = connectPlanned(countingIds(), plan)
    expect(made.ok && made.edit.label).toBe('Connect W1 to bays 2 and 3')
  })

  it('passes over a bay that is fed already and says so', () => {
    const before = buildOf(looseParts)
    const build = after(before, connect(before, countingIds(), end('w', 'out-4'), end('c2', 'plug')))
    const plan = planToBays(build, part(build, 'w'), { case: 'a', slot: 1 })
    expect(plan.joints.map((joint) => joint.slot)).toEqual([1, 3])
    expect(plan.notes[0]).toBe('Bay 2 passed over. C2 already holds W1.4. Remove that joint first.')
  })

  it('takes only as many outlets as asked', () => {
    const build = buildOf(looseParts)
    expect(planToBays(build, part(build, 'b'), { case: 'a', slot: 1 }, 2).joints).toHaveLength(2)
  })

  it('leaves the inlet of a lead out', () => {
    const build = buildOf(looseParts)
    expect(outletsForBays(build, part(build, 'w')).map((outlet) => outlet.connector.id)).toEqual([
      'out-1',
      'out-2',
      'out-3',
      'out-4',
    ])
  })

  it("reaches a backplane's own data connectors by their bays", () => {
    const build = buildOf({
      parts: [
        { id: 'a', model: 'box', ref: 'A1' },
        { id: 'u', model: 'plane-4', ref: 'U1', bay: { case: 'a', slot: 1 } },
        { id: 'b', model: 'breakout-4', ref: 'W1' },
      ],
    })
    const plan = planToBays(build, part(build, 'b'), { case: 'a', slot: 2 })
    expect(plan.joints.map((joint) => [joint.from.connector.id, joint.to.connector.id])).toEqual([
      ['leg-1', 'data-2'],
      ['leg-2', 'data-3'],
      ['leg-3', 'data-4'],
    ])
  })

  it('pairs the connectors of two parts', () => {
    const build = buildOf({
      parts: [
        { id: 'w', model: 'lead-4', ref: 'W1' },
        { id: 's', model: 'splitter-2', ref: 'W2' },
      ],
    })
    const plan = planToPart(part(build, 'w'), part(build, 's'))
    const made = connectPlanned(countingIds(), plan)
    expect(made.ok && made.edit.label).toBe('Connect W1.1 to W2 in')
  })
})
