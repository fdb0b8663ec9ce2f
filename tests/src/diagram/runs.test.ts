import { describe, expect, it } from 'vitest'
import { arrange } from '#shared/layout/arrange.ts'
import { openEnds } from '../../../src/diagram/openEnds.ts'
import { runMaker } from '../../../src/diagram/runs.ts'
import { buildOf, looseParts } from '../../shared/build/edits/smallShop.ts'

const build = buildOf({
  ...looseParts,
  joints: [
    { id: 'j1', a: { part: 't', connector: 'drive-1' }, b: { part: 'w', connector: 'supply' } },
    { id: 'j2', a: { part: 'w', connector: 'out-1' }, b: { part: 'c1', connector: 'plug' } },
  ],
})
const drawing = arrange(build)

describe('runs', () => {
  it('has one run a joint', () => {
    expect(
      runMaker(drawing)
        .all()
        .map((run) => run.joint),
    ).toEqual(['j1', 'j2'])
  })

  it('finds what hangs on a node, once, and moves only its end', () => {
    const maker = runMaker(drawing)
    const touching = maker.touching(['w', 't'])
    expect(touching.map((run) => run.id).sort()).toEqual(['j1', 'j2'])
    const run = touching.find((one) => one.id === 'j2')
    if (!run) throw new Error('no run')
    const still = maker.make(run)
    const moved = maker.make(run, new Map([['w', { x: 40, y: -12 }]]))
    expect(moved?.course.from.x).toBe((still?.course.from.x ?? 0) + 40)
    expect(moved?.course.from.y).toBe((still?.course.from.y ?? 0) - 12)
    expect(moved?.course.to).toEqual(still?.course.to)
  })
})

describe('open ends', () => {
  it('says what a drive lacks on which side, and which cable hangs free', () => {
    const words = openEnds(drawing, build).map((end) => `${end.node} ${end.side} ${end.text}`)
    expect(words).toContain('c1 right no data path')
    expect(words).not.toContain('c1 left no power')
    expect(words).toContain('c2 left no power')
    expect(words).toContain('b right open end')
    expect(words.some((line) => line.startsWith('t '))).toBe(false)
  })
})
