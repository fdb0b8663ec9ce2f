import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import { duplicateParts } from '#shared/build/edits/duplicate.ts'
import { removeChosen, removeParts } from '#shared/build/edits/remove.ts'
import { buildOf, countingIds, looseParts } from './smallShop.ts'

const joined = {
  ...looseParts,
  joints: [
    { id: 'j1', a: { part: 't', connector: 'drive-1' }, b: { part: 'w', connector: 'supply' } },
    { id: 'j2', a: { part: 'w', connector: 'out-1' }, b: { part: 'c1', connector: 'plug' } },
    { id: 'j3', a: { part: 'w', connector: 'out-2' }, b: { part: 'c2', connector: 'plug' } },
  ],
}

describe('removeParts', () => {
  it('takes the joints along', () => {
    const build = buildOf(joined)
    const made = removeParts(build, ['w'])
    if (!made.ok) throw new Error(made.reason)
    expect(made.edit.label).toBe('Remove W1 and 3 joints')
    expect(apply(build.document, made.edit.changes).joints).toEqual([])
  })

  it('leaves the drives of a removed case, out of their bays', () => {
    const build = buildOf(joined)
    const made = removeParts(build, ['a'])
    if (!made.ok) throw new Error(made.reason)
    const document = apply(build.document, made.edit.changes)
    expect(document.parts.filter((part) => part.bay)).toEqual([])
    expect(document.parts).toHaveLength(6)
  })

  it('removes chosen joints once, even where their part goes too', () => {
    const build = buildOf(joined)
    const made = removeChosen(build, ['c1'], ['j2', 'j3'])
    if (!made.ok) throw new Error(made.reason)
    expect(apply(build.document, made.edit.changes).joints.map((joint) => joint.id)).toEqual(['j1'])
  })

  it('refuses when nothing is chosen', () => {
    expect(removeChosen(buildOf(joined), [], [])).toEqual({ ok: false, reason: 'Nothing is chosen.' })
  })
})

describe('duplicateParts', () => {
  it('copies joints among the chosen, but no serial', () => {
    const build = buildOf(joined)
    const made = duplicateParts(build, countingIds(), ['w', 'c1'])
    if (!made.ok) throw new Error(made.reason)
    const document = apply(build.document, made.edit.changes)
    expect(document.parts.slice(7).map((part) => [part.ref, part.serial, part.bay?.slot])).toEqual([
      ['W3', undefined, undefined],
      ['C4', undefined, 4],
    ])
    expect(document.joints.slice(3).map((joint) => joint.a.connector)).toEqual(['out-1'])
  })

  it('makes N copies, each with its own designation and bay', () => {
    const build = buildOf(looseParts)
    const made = duplicateParts(build, countingIds(), ['c3'], 3)
    if (!made.ok) throw new Error(made.reason)
    const document = apply(build.document, made.edit.changes)
    expect(document.parts.slice(7).map((part) => [part.ref, part.bay?.slot])).toEqual([
      ['C4', 4],
      ['C5', 5],
      ['C6', 6],
    ])
  })
})
