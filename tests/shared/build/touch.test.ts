import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { apply, ChangeError } from '#shared/build/apply.ts'
import type { Change } from '#shared/build/changes.ts'
import { buildDocumentSchema, type BuildDocument } from '#shared/build/document.ts'
import { clashes, touched } from '#shared/build/touch.ts'

const add = (id: string, ref: string): Change => ({ op: 'addPart', part: { id, ref, model: 'm' } })
const patch = (id: string, fields: object): Change => ({ op: 'updatePart', id, patch: fields })
const join = (id: string, a: string, b: string): Change => ({
  op: 'addJoint',
  joint: { id, a: { part: a, connector: 'x' }, b: { part: b, connector: 'y' } },
})
const settings = buildDocumentSchema.shape.settings.parse({})
const accepted = { key: 'k', reason: 'r', by: 'b', on: '2026-12-01', severity: 'note' } as const
const collide = (ours: Change[], theirs: Change[]) => clashes(touched(ours), touched(theirs))

describe('changes collide', () => {
  test.each<[string, Change[], Change[], string[]]>([
    ['over one field', [patch('p1', { note: 'a' })], [patch('p1', { note: 'b', serial: 's' })], ['parts/p1/note']],
    ['over a removed part', [patch('p1', { note: 'a' })], [{ op: 'removePart', id: 'p1' }], ['parts/p1']],
    ['over a joint to a removed part', [join('j1', 'p1', 'p2')], [{ op: 'removePart', id: 'p2' }], ['parts/p2']],
    [
      'over a drive put into a removed case',
      [patch('p1', { bay: { case: 'c', slot: 1 } })],
      [{ op: 'removePart', id: 'c' }],
      ['parts/c'],
    ],
    ['over one joint', [{ op: 'removeJoint', id: 'j1' }], [{ op: 'removeJoint', id: 'j1' }], ['joints/j1']],
    ['over one designation', [add('p1', 'W1')], [add('p2', 'W1')], ['refs/W1']],
    ['over a designation changed and given', [patch('p1', { ref: 'W2' })], [add('p2', 'W2')], ['refs/W2']],
    [
      'over a joint to a part of another model by now',
      [join('j1', 'p1', 'p2')],
      [patch('p1', { model: 'n' })],
      ['parts/p1/connectors'],
    ],
    [
      'over figures of a part of another model by now',
      [patch('p1', { overrides: {} })],
      [patch('p1', { model: 'n' })],
      ['parts/p1/overrides'],
    ],
    ['over a removed own model', [add('p1', 'W1')], [{ op: 'removeModel', id: 'm' }], ['models/m']],
    ['over the settings', [{ op: 'updateSettings', settings }], [{ op: 'updateSettings', settings }], ['settings']],
    ['over the name', [{ op: 'rename', name: 'a' }], [{ op: 'rename', name: 'b', machine: 'x' }], ['build/name']],
    [
      'over an acceptance',
      [{ op: 'acceptFinding', accepted }],
      [{ op: 'withdrawAcceptance', key: 'k' }],
      ['accepted/k'],
    ],
  ])('%s', (_how, ours, theirs, expected) => {
    expect(collide(ours, theirs)).toEqual(expected)
    expect(collide(theirs, ours)).toEqual(expected)
  })
})

describe('changes do not collide', () => {
  test.each<[string, Change[], Change[]]>([
    ['on other parts', [patch('p1', { note: 'a' })], [patch('p2', { note: 'b' })]],
    ['on other fields', [patch('p1', { note: 'a' })], [patch('p1', { position: { x: 1, y: 2 } })]],
    ['when one moves a part that the other joins', [join('j1', 'p1', 'p2')], [patch('p1', { position: null })]],
    ['with two joints at one drive, one for power and one for data', [join('j1', 'd', 'w')], [join('j2', 'd', 'k')]],
    [
      'with two drives into one case',
      [patch('p1', { bay: { case: 'c', slot: 1 } })],
      [patch('p2', { bay: { case: 'c', slot: 2 } })],
    ],
    ['when both use one own model', [add('p1', 'W1')], [add('p2', 'W2')]],
  ])('%s', (_how, ours, theirs) => {
    expect(collide(ours, theirs)).toEqual([])
    expect(collide(theirs, ours)).toEqual([])
  })
})

/** A document of six parts and three joints, and changes that fit it now and then. */
const ids = ['p1', 'p2', 'p3', 'p4', 'p5', 'p6', 'p7', 'p8']
const start: BuildDocument = apply(
  buildDocumentSchema.parse({ format: 'bayloom-build', version: 1, name: 'n', parts: [], joints: [] }),
  [...ids.slice(0, 6).map((id, i) => add(id, `W${i + 1}`)), join('j1', 'p1', 'p2'), join('j2', 'p2', 'p3')],
)
const anId = fc.constantFrom(...ids)
const aJoint = fc.constantFrom('j1', 'j2', 'j3', 'j4')
const aChange: fc.Arbitrary<Change> = fc.oneof(
  fc.tuple(anId, fc.integer({ min: 1, max: 12 })).map(([id, n]) => add(id, `W${n}`)),
  anId.map((id): Change => ({ op: 'removePart', id })),
  fc.tuple(anId, fc.constantFrom('note', 'serial', 'name'), fc.string()).map(([id, f, v]) => patch(id, { [f]: v })),
  fc.tuple(aJoint, anId, anId).map(([id, a, b]) => join(id, a, b)),
  aJoint.map((id): Change => ({ op: 'removeJoint', id })),
  fc.string({ minLength: 1 }).map((name): Change => ({ op: 'rename', name })),
)
const someChanges = fc.array(aChange, { minLength: 1, maxLength: 4 })

/** The document after the changes, its lists by id; null where they do not fit. */
function after(document: BuildDocument, ...lists: Change[][]): unknown {
  try {
    const { parts, joints, ...rest } = apply(document, lists.flat())
    const byId = (a: { id: string }, b: { id: string }) => (a.id < b.id ? -1 : 1)
    return { ...rest, parts: [...parts].sort(byId), joints: [...joints].sort(byId) }
  } catch (error) {
    if (error instanceof ChangeError) return null
    throw error
  }
}

test('what does not collide fits in either order, with the same outcome', () => {
  let tried = 0
  fc.assert(
    fc.property(someChanges, someChanges, (ours, theirs) => {
      if (after(start, ours) === null || after(start, theirs) === null) return
      if (collide(ours, theirs).length > 0) return
      tried++
      const one = after(start, ours, theirs)
      expect(one).not.toBeNull()
      expect(after(start, theirs, ours)).toEqual(one)
    }),
    { numRuns: 3000 },
  )
  expect(tried).toBeGreaterThan(100)
})
