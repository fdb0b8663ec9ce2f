import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import type { Change } from '#shared/build/changes.ts'
import { resolve, type ResolvedBuild } from '#shared/build/resolve.ts'
import { cableLabels, isCable, isInUse } from '#shared/paper/labels/cableLabels.ts'
import { compareLabels, contentKey, type Label } from '#shared/paper/labels/label.ts'
import { labelsOf, spareCables } from '#shared/paper/labels/spareLabels.ts'
import { backplanes, tenDrives } from '../../layout/sampleBuilds.ts'
import { buildOf, smallCatalog } from '../../layout/smallCatalog.ts'
import { wildBuild } from '../../layout/wildBuild.ts'

const words = (build: ResolvedBuild, id: string): string[] => {
  const label = labelsOf(build).find((one) => one.id === id)
  expect(label, `no label ${id}`).toBeDefined()
  return label!.lines.map(({ text }) => text)
}
const changed = (build: ResolvedBuild, ...changes: Change[]): ResolvedBuild =>
  resolve(apply(build.document, changes), smallCatalog)
const ids = (labels: readonly Label[]): string[] => labels.map(({ id }) => id)

describe('what a label says', () => {
  const build = tenDrives()

  it('names the leg, the drive it sits on and the port at its other end, with what powers it', () => {
    expect(words(build, 'W8#leg-2')).toEqual(['W7 leg 2', 'here: C2, bay 2', 'far end: K1 port A; power: W1 out 2'])
  })

  it('tells the trunk which drives hang on it', () => {
    expect(words(build, 'W8#host')).toEqual(['W7 host', 'here: K1 port A', 'far end: C1 to C4, bays 1 to 4'])
  })

  it('follows a splitter down to what it feeds and up to what feeds it', () => {
    const [, here, far] = words(build, 'W6#in')
    expect(here).toBe('here: W2 out 2')
    expect(far).toBe('far end: W8 tail 2 to 4')
    expect(words(build, 'W6#out-1').at(-1)).toBe('far end: W2 out 2')
  })

  it('says so where nothing is plugged in', () => {
    expect(words(build, 'W6#out-4')[1]).toBe('here: free')
    expect(cableLabels(build).find(({ id }) => id === 'W6#out-4')?.isJoined).toBe(false)
  })

  it('gives a tray its bay, the tail of its serial and both its paths', () => {
    const [place, tail, serial, , paths] = words(build, 'tray:C3')
    expect(place).toBe('bay 3 · C3')
    expect(serial?.endsWith(tail?.replace('…', '') ?? 'no tail')).toBe(true)
    expect(paths).toBe('power and data: W7 leg 3')
    expect(words(build, 'tray:C9').at(-1)).toBe('power: W6 out 1; data: W9 a')
  })

  it('warns on the bag of spare leads', () => {
    const spare = buildOf([
      { id: 'a', model: 'lead-3' },
      { id: 'b', model: 'lead-3' },
      { id: 'c', model: 'cable-data' },
    ])
    const labels = labelsOf(spare)
    expect(ids(labels)).toEqual(['spare:family not known', 'spare:any supply'])
    expect(labels[0]?.lines.map(({ text }) => text).join('\n')).toMatch(/Measure every pin[^]*W1, W2/)
  })
})

describe('every end once', () => {
  it.each([
    ['ten drives', tenDrives()],
    ['backplanes', backplanes()],
  ] as const)('%s', (_, build) => {
    const wanted = build.parts
      .filter((part) => isCable(part) && isInUse(part))
      .flatMap(({ part, connectors }) => connectors.map(({ connector }) => `${part.id}#${connector.id}`))
    expect(wanted.length).toBeGreaterThan(10)
    const cables = ids(cableLabels(build)).filter((id) => !build.partById.get(id.split('#')[0] ?? '')?.model.supply)
    expect([...cables].sort()).toEqual([...wanted].sort())
  })

  it('holds for any document', () => {
    fc.assert(
      fc.property(wildBuild, (build) => {
        const labels = labelsOf(build)
        expect(new Set(ids(labels)).size).toBe(labels.length)
        for (const part of build.parts.filter(isCable)) {
          const own = labels.filter(({ id }) => id.startsWith(`${part.part.id}#`))
          expect(own.length).toBe(isInUse(part) ? part.connectors.length : 0)
          if (!isInUse(part)) expect(spareCables(build)).toContain(part)
        }
        for (const label of labels) expect(contentKey(label).trim()).not.toBe('')
      }),
      { numRuns: 60 },
    )
  })
})

describe('only what changed', () => {
  const before = tenDrives()

  it('says nothing where nothing changed', () => {
    expect(compareLabels(labelsOf(before), labelsOf(before))).toEqual({ changed: [], gone: [] })
    const moved = changed(before, { op: 'updatePart', id: 'W8', patch: { position: { x: 5, y: 5 } } })
    expect(compareLabels(labelsOf(before), labelsOf(moved)).changed).toEqual([])
  })

  it('names the tray of a drive with a new serial', () => {
    const after = changed(before, { op: 'updatePart', id: 'C3', patch: { serial: 'NEW00042' } })
    expect(ids(compareLabels(labelsOf(before), labelsOf(after)).changed)).toEqual(['tray:C3'])
  })

  it('names both ends of a cable whose one end moved, and what is no longer there', () => {
    const joint = before.joints.find(({ a, b }) => a.part.part.id === 'W10' && b.part.part.id === 'C9')
    const after = changed(before, { op: 'removeJoint', id: joint!.joint.id })
    const { changed: told } = compareLabels(labelsOf(before), labelsOf(after))
    expect(ids(told).sort()).toEqual(['W10#a', 'W10#b', 'tray:C9'])
    const joints = before.joints.filter(({ a, b }) => a.part.part.id === 'W10' || b.part.part.id === 'W10')
    const without = changed(before, ...joints.map(({ joint: { id } }): Change => ({ op: 'removeJoint', id })), {
      op: 'removePart',
      id: 'W10',
    })
    expect(ids(compareLabels(labelsOf(before), labelsOf(without)).gone).sort()).toEqual(['W10#a', 'W10#b'])
  })
})
