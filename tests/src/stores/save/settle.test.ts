import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import type { Edit } from '#shared/build/changes.ts'
import { rebase } from '#shared/build/edits/rebase.ts'
import { describeClashes, settleEdits, type Side } from '../../../../src/stores/save/settle.ts'
import { documentOf, looseParts } from '../../../shared/build/edits/smallShop.ts'

const first = documentOf({
  ...looseParts,
  joints: [{ id: 'j1', a: { part: 'w', connector: 'out-1' }, b: { part: 'c1', connector: 'plug' } }],
})
const after = (edits: readonly Edit[]) => edits.reduce((document, edit) => apply(document, edit.changes), first)
const settle = (theirs: Edit[], mine: Edit[], choices: Record<string, Side>) =>
  rebase(after(theirs), settleEdits(after(theirs), after(mine), mine, new Map(Object.entries(choices))))

const serial = (text: string): Edit => ({
  label: 'serial',
  changes: [{ op: 'updatePart', id: 'c1', patch: { serial: text, note: `note ${text}` } }],
})
const removal: Edit = {
  label: 'Remove C1',
  changes: [
    { op: 'removeJoint', id: 'j1' },
    { op: 'removePart', id: 'c1' },
  ],
}
const serialOf = (document: typeof first) => document.parts.find((part) => part.id === 'c1')?.serial

describe('settling a conflict', () => {
  it('shows both sides in words and leaves taken designations out', () => {
    const clashes = describeClashes(
      ['parts/c1/serial', 'refs/W3', 'parts/c2'],
      after([serial('M')]),
      after([serial('T')]),
    )
    expect(clashes).toEqual([
      { id: 'parts/c1/serial', what: 'serial of C1', mine: 'M', theirs: 'T' },
      { id: 'parts/c2', what: 'C2', mine: 'kept, with changes', theirs: 'kept, with changes' },
    ])
  })

  it('gives up one field and keeps the rest of the same edit', () => {
    const { document } = settle([serial('T')], [serial('M')], { 'parts/c1/serial': 'theirs', 'parts/c1/note': 'mine' })
    expect(document.parts.find((part) => part.id === 'c1')).toMatchObject({ serial: 'T', note: 'note M' })
  })

  it('brings back a part with its joints where the other removed it', () => {
    const { document, dropped } = settle([removal], [serial('M')], { 'parts/c1': 'mine' })
    expect(serialOf(document)).toBe('M')
    expect(document.joints.map((joint) => joint.id)).toEqual(['j1'])
    expect(dropped).toEqual([])
  })

  it("lets the other's removal stand", () => {
    const { document, dropped } = settle([removal], [serial('M')], { 'parts/c1': 'theirs' })
    expect(document.parts.some((part) => part.id === 'c1')).toBe(false)
    expect(dropped).toEqual([])
  })

  it('removes what the other plugged in meanwhile, where one keeps the removal', () => {
    const plugged: Edit = {
      label: 'Connect',
      changes: [
        {
          op: 'addJoint',
          joint: { id: 'j9', a: { part: 'b', connector: 'leg-1' }, b: { part: 'c1', connector: 'plug' } },
        },
      ],
    }
    const { document } = settle([plugged], [removal], { 'parts/c1': 'mine' })
    expect(document.parts.some((part) => part.id === 'c1')).toBe(false)
    expect(document.joints).toEqual([])
  })
})
