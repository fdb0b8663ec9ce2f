import { describe, expect, it } from 'vitest'
import { textSummary } from '#shared/paper/text.ts'
import { tenDrives } from '../layout/sampleBuilds.ts'
import { buildOf } from '../layout/smallCatalog.ts'
import { sampleResult } from './sampleResult.ts'

describe('textSummary', () => {
  const build = tenDrives()
  const lines = textSummary(build, sampleResult(build)).split('\n')

  it('begins with the machine and the verdict', () =>
    expect(lines.slice(0, 2)).toEqual(['Reel vault, north room (RV-N-01)', 'Within the stated limits: no: 1 fault']))

  it('says how each drive is fed and reached, through splitters and tails', () => {
    expect(lines).toContainEqual(
      expect.stringMatching(
        /^ {2}bay 7: C7, .*; power T1 drive 2 > W2 out 2 > W5 out 2 > W8 leg 3; data K1 port A, lane 0$/,
      ),
    )
    expect(lines).toContainEqual(expect.stringMatching(/bay 9: C9, .*; power T1 drive 3 > W3 out 1 > W6 out 1;/))
  })

  it('says what has no partner', () => {
    expect(lines).toContainEqual(expect.stringMatching(/bay 10: C10, .*; no data path$/))
    const alone = buildOf([{ id: 'x', model: 'drive' }])
    expect(textSummary(alone, sampleResult(alone))).toContain('no bay: C1, 1 TB SAS, 7200 rpm; not fed; no data path')
  })

  it('lists findings, worst first, with what to do', () => {
    const found = lines.filter((line) => /^ {2}(fault|caution): /.test(line))
    expect(found[0]).toMatch(/^ {2}fault: W6, inlet: .* Move one drive/)
    expect(found[1]).toMatch(/^ {2}caution: /)
  })

  it('does not go round for ever in a circle of splitters', () => {
    const circle = buildOf(
      [
        { id: 'x', model: 'drive' },
        { id: 'a', model: 'splitter-2' },
        { id: 'b', model: 'splitter-2' },
      ],
      ['a.out-1 b.in', 'b.out-1 a.in', 'a.out-2 x.plug'],
    )
    expect(textSummary(circle, sampleResult(circle))).toContain('power in a circle at')
  })
})
