import { describe, expect, it } from 'vitest'
import { nearestDominators } from '#shared/rules/shared-fate/dominators.ts'
import { sharedFate } from '#shared/rules/shared-fate/index.ts'
import { documentOf, merged, times } from '../../helpers/fixtures/build.ts'
import { findingsOf, gist } from '../../helpers/findingsOf.ts'

const members = (count: number) =>
  merged(times(count, (i) => [`C${i}`, { model: 'sata-4tb', role: 'data' as const }] as const))
const data = (count: number) => ['K1.port-a W1.host', ...times(count, (i) => `W1.leg-${i} C${i}.plug`)]
const base = { T1: 'supply', K1: 'hba-4i', W1: 'breakout-sata', W2: 'lead', W3: 'splitter' }

describe('shared-fate', () => {
  const check = (parity: number, ...[parts, joints]: Parameters<typeof documentOf>) =>
    findingsOf(sharedFate, documentOf(parts, joints, { settings: { array: { parityDrives: parity } } }))
  const fromLead = [...data(3), 'T1.drive-1 W2.supply', ...times(3, (i) => `W2.out-${i} C${i}.plug`)]
  const throughSplitter = [
    ...data(3),
    'T1.drive-1 W2.supply',
    'W2.out-1 W3.in',
    'W3.out-1 C1.plug',
    'W3.out-2 C2.plug',
    'W2.out-2 C3.plug',
  ]

  it('names what serves many in one note', () => {
    const findings = check(1, { ...base, ...members(3) }, fromLead)
    expect(gist(findings)).toEqual(['note build'])
    expect(findings[0]?.message).toContain('K1 (3 of 3), T1 (3 of 3), W1 (3 of 3) and W2 (3 of 3)')
  })

  it('cautions about a splitter that takes more than the array can lose', () => {
    expect(gist(check(1, { ...base, ...members(3) }, throughSplitter))).toEqual(['caution W3', 'note build'])
    expect(gist(check(2, { ...base, ...members(3) }, throughSplitter))).toEqual(['note build'])
    expect(check(3, { ...base, ...members(3) }, throughSplitter)).toEqual([])
  })

  it('is quiet without an array or without redundancy', () => {
    expect(check(0, { ...base, ...members(3) }, fromLead)).toEqual([])
    expect(check(1, { ...base, C1: 'sata-4tb', C2: 'sata-4tb', C3: 'sata-4tb' }, fromLead)).toEqual([])
  })

  it('does not count a cable that another one stands in for', () => {
    // Two cables to one expander: either may fail.
    const parts = {
      K1: 'hba-8i',
      K2: 'expander-6',
      W4: 'cable-8087',
      W5: 'cable-8087',
      W1: 'breakout-sata',
      ...members(3),
    }
    const twoCables = [
      'K1.port-a W4.a',
      'W4.b K2.port-1',
      'K1.port-b W5.a',
      'W5.b K2.port-2',
      'K2.port-3 W1.host',
      ...data(3).slice(1),
    ]
    const [finding] = check(1, parts, twoCables)
    expect(finding?.message).toContain('K1 (3 of 3), K2 (3 of 3) and W1 (3 of 3)')
  })
})

describe('dominators', () => {
  const graph = (count: number, edges: [number, number][]) => {
    const neighbours: number[][] = Array.from({ length: count }, () => [])
    for (const [a, b] of edges) {
      neighbours[a]?.push(b)
      neighbours[b]?.push(a)
    }
    return [...nearestDominators(neighbours)]
  }

  it('in a chain everything hangs on what comes before', () => {
    expect(
      graph(4, [
        [0, 1],
        [1, 2],
        [2, 3],
      ]),
    ).toEqual([0, 0, 1, 2])
  })

  it('where two ways meet only what comes before both counts', () => {
    expect(
      graph(5, [
        [0, 1],
        [1, 2],
        [1, 3],
        [2, 4],
        [3, 4],
      ]),
    ).toEqual([0, 0, 1, 1, 1])
  })

  it('what the root does not reach has none', () => {
    expect(graph(3, [[0, 1]])).toEqual([0, 0, -1])
  })
})
