import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { invert } from '#shared/build/invert.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import { resolve, type ResolvedBuild } from '#shared/build/resolve.ts'
import { connect } from '#shared/build/edits/connect.ts'
import { connectPlanned, planToBays } from '#shared/build/edits/consecutive.ts'
import { duplicateParts } from '#shared/build/edits/duplicate.ts'
import type { EditOutcome, MakeId } from '#shared/build/edits/outcome.ts'
import { addParts } from '#shared/build/edits/place.ts'
import { removeChosen } from '#shared/build/edits/remove.ts'
import { moveParts, patchPart } from '#shared/build/edits/revise.ts'
import { leaveBay, moveToBay } from '#shared/build/edits/seat.ts'
import { countingIds, documentOf, smallCatalog } from './smallShop.ts'

type Gesture = (build: ResolvedBuild, makeId: MakeId) => EditOutcome

const index = fc.nat(1000)
const pick = <T>(items: readonly T[], i: number): T | undefined => items[i % Math.max(1, items.length)]
const idOf = (build: ResolvedBuild, i: number) => pick(build.parts, i)?.part.id ?? 'none'
const endAt = (build: ResolvedBuild, i: number) => {
  const connector = pick(build.connectors, i)
  return { part: connector?.part.part.id ?? 'none', connector: connector?.connector.id ?? 'none' }
}
const bayAt = (build: ResolvedBuild, i: number) => ({
  case: build.parts.find((part) => part.model.kind === 'case')?.part.id ?? 'none',
  slot: (i % 9) + 1,
})

/** Any gesture of the screen, on whatever parts there happen to be. */
const gesture: fc.Arbitrary<Gesture> = fc.oneof(
  fc.tuple(fc.constantFrom(...smallCatalog.models.keys()), fc.integer({ min: 1, max: 4 })).map(
    ([model, count]): Gesture =>
      (build, makeId) =>
        addParts(build, makeId, model, { count }),
  ),
  fc.tuple(index, index).map(
    ([a, b]): Gesture =>
      (build, makeId) =>
        connect(build, makeId, endAt(build, a), endAt(build, b)),
  ),
  fc.tuple(index, index).map(([a, b]): Gesture => (build, makeId) => {
    const part = pick(build.parts, a)
    return part ? connectPlanned(makeId, planToBays(build, part, bayAt(build, b))) : { ok: false, reason: 'none' }
  }),
  fc.tuple(index, index).map(
    ([a, b]): Gesture =>
      (build, makeId) =>
        moveToBay(build, makeId, idOf(build, a), bayAt(build, b)),
  ),
  index.map(
    (a): Gesture =>
      (build) =>
        leaveBay(build, idOf(build, a)),
  ),
  fc.tuple(index, index).map(
    ([a, b]): Gesture =>
      (build) =>
        removeChosen(build, [idOf(build, a)], [pick(build.joints, b)?.joint.id ?? 'none']),
  ),
  fc.tuple(index, fc.integer({ min: 1, max: 3 })).map(
    ([a, n]): Gesture =>
      (build, makeId) =>
        duplicateParts(build, makeId, [idOf(build, a), idOf(build, a + 1)], n),
  ),
  fc.tuple(index, fc.string({ maxLength: 8 })).map(
    ([a, serial]): Gesture =>
      (build) =>
        patchPart(build.document, idOf(build, a), { serial: serial || null }),
  ),
  fc.tuple(index, fc.integer({ min: -50, max: 50 })).map(
    ([a, x]): Gesture =>
      (build) =>
        moveParts(build.document, new Map([[idOf(build, a), { x, y: 0 }]])),
  ),
)

/** Lists may end in another order: content is what counts. */
const content = (document: BuildDocument) => ({
  ...document,
  parts: [...document.parts].sort((a, b) => a.id.localeCompare(b.id)),
  joints: [...document.joints].sort((a, b) => a.id.localeCompare(b.id)),
})

describe('every gesture', () => {
  it('can be undone, leaves a document that resolves, and never plugs one contact twice', () => {
    fc.assert(
      fc.property(fc.array(gesture, { minLength: 1, maxLength: 25 }), (gestures) => {
        const makeId = countingIds()
        let document = documentOf({ parts: [{ id: 'a', model: 'box', ref: 'A1' }] })
        for (const act of gestures) {
          const made = act(resolve(document, smallCatalog), makeId)
          if (!made.ok) {
            expect(made.reason).not.toBe('')
            continue
          }
          const next = apply(document, made.edit.changes)
          const back = apply(next, invert(document, made.edit.changes))
          expect(content(back)).toEqual(content(document))
          document = next
        }
        const build = resolve(document, smallCatalog)
        expect(build.problems).toEqual([])
        expect(new Set(document.parts.map((part) => part.ref)).size).toBe(document.parts.length)
        for (const connector of build.connectors) {
          expect(connector.joints.filter((joint) => joint.mating.power).length).toBeLessThanOrEqual(1)
          expect(connector.joints.filter((joint) => joint.mating.lanes > 0).length).toBeLessThanOrEqual(1)
        }
      }),
      { numRuns: 150 },
    )
  })
})
