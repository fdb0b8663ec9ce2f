import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import type { Change } from '#shared/build/changes.ts'
import { roles, type BuildDocument } from '#shared/build/document.ts'
import { check } from '#shared/check/check.ts'
import { createChecker } from '#shared/check/incremental.ts'
import { catalog, documentOf } from '../../helpers/fixtures/build.ts'
import { figure } from '../../helpers/fixtures/models.ts'

const start = documentOf(
  {
    A1: 'case',
    T1: 'supply',
    K1: 'raid-8i',
    K2: 'board-narrow',
    W1: 'breakout-sata',
    W2: 'lead',
    W3: 'splitter',
    C1: { model: 'sata-4tb', role: 'data', bay: { case: 'A1', slot: 1 } },
    C2: { model: 'sata-4tb', role: 'data', serial: 'RV2' },
    C3: { model: 'sata-4tb', role: 'parity' },
  },
  [
    'K1.edge K2.slot-1',
    'K1.port-a W1.host',
    'W1.leg-1 C1.plug',
    'W1.leg-2 C2.plug',
    'T1.drive-1 W2.supply',
    'W2.out-1 W3.in',
    'W3.out-1 C1.plug',
    'W3.out-2 C2.plug',
  ],
)

type Edit = (document: BuildDocument) => Change[]
const drives = ['C1', 'C2', 'C3'] as const
const part = fc.constantFrom(...drives)
const update = (id: string, patch: object): Change => ({ op: 'updatePart', id, patch })
const free = { a: { part: 'W1', connector: 'leg-3' }, b: { part: 'C3', connector: 'plug' } }

/** Edits of every reach: drawing, words, places, acceptances, currents, lanes. */
const edit: fc.Arbitrary<Edit> = fc.oneof(
  fc.record({ part, x: fc.nat(100) }).map(({ part: id, x }): Edit => () => [update(id, { position: { x, y: 0 } })]),
  fc.record({ part, note: fc.string() }).map(({ part: id, note }): Edit => () => [update(id, { note })]),
  fc
    .record({ part, serial: fc.constantFrom('RV1', 'RV2', null) })
    .map(({ part: id, serial }): Edit => () => [update(id, { serial })]),
  fc
    .record({ part, slot: fc.integer({ min: 1, max: 6 }) })
    .map(({ part: id, slot }): Edit => () => [update(id, { bay: { case: 'A1', slot } })]),
  fc.constantFrom('pass-through', 'combined', null).map((mode): Edit => () => [update('K1', { mode })]),
  fc
    .record({ part, role: fc.constantFrom(...roles, null) })
    .map(({ part: id, role }): Edit => () => [update(id, { role })]),
  fc
    .record({ part, name: fc.constantFrom('left', 'right', null) })
    .map(({ part: id, name }): Edit => () => [update(id, { name })]),
  fc
    .integer({ min: 1, max: 9 })
    .map((value): Edit => () => [update('C1', { overrides: { 'load.12V.start.peak_A': figure(value) } })]),
  fc
    .integer({ min: 0, max: 3 })
    .map((parityDrives): Edit => ({ settings }) => [
      { op: 'updateSettings', settings: { ...settings, array: { ...settings.array, parityDrives } } },
    ]),
  fc.constant<Edit>(({ joints }) =>
    joints.some((joint) => joint.id === 'free')
      ? [{ op: 'removeJoint', id: 'free' }]
      : [{ op: 'addJoint', joint: { id: 'free', ...free } }],
  ),
  fc.nat().map((choice): Edit => (document) => {
    const { findings } = check(document, catalog)
    const finding = findings[choice % Math.max(1, findings.length)]
    if (!finding) return []
    const { key, severity, load } = finding
    const accepted = {
      key,
      severity,
      reason: 'seen',
      by: 'Ines',
      on: '2026-11-30',
      ...(load === undefined ? {} : { load }),
    }
    return finding.accepted ? [{ op: 'withdrawAcceptance', key }] : [{ op: 'acceptFinding', accepted }]
  }),
  fc.constantFrom('north', 'south').map((name): Edit => () => [{ op: 'rename', name }]),
)

describe('a checker that remembers', () => {
  it('answers after any edits as a full check does', () => {
    fc.assert(
      fc.property(fc.array(edit, { minLength: 1, maxLength: 12 }), (edits) => {
        const checker = createChecker(catalog, { strict: true })
        let document = start
        expect(checker(document)).toEqual(check(document, catalog))
        for (const changes of edits) {
          document = apply(document, changes(document))
          expect(checker(document)).toEqual(check(document, catalog))
        }
      }),
      { numRuns: 25 },
    )
  })

  it('makes nothing anew for what it does not read', () => {
    const checker = createChecker(catalog)
    const before = checker(start)
    expect(checker(apply(start, [update('C1', { position: { x: 1, y: 2 } })]))).toBe(before)
    expect(checker(apply(start, [update('C1', { serial: 'RV1' })]))).not.toBe(before)
  })

  it('does not mix up two builds that are given in turn', () => {
    const other = documentOf({ C1: 'sas-4tb' })
    const checker = createChecker(catalog)
    for (const document of [start, other, start]) expect(checker(document)).toEqual(check(document, catalog))
  })
})
