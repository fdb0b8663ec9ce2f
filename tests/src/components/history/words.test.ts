import { describe, expect, it } from 'vitest'
import type { ToldChange } from '#shared/build/compareTold.ts'
import type { MarginChange } from '#shared/check/compareResults.ts'
import type { Revision } from '#shared/contract/revisions.ts'
import { byDay } from '../../../../src/components/history/days.ts'
import { groupChanges } from '../../../../src/components/history/groups.ts'
import { litMarks } from '../../../../src/components/history/litMarks.ts'
import { loadWords, marginText, wayOf } from '../../../../src/components/history/marginWords.ts'

const change = (more: Partial<ToldChange>): ToldChange => ({
  group: 'parts',
  mark: 'changed',
  text: 'C1: note set to loud.',
  parts: ['C1'],
  ...more,
})

describe('what is lit on the sheet', () => {
  const changes = [
    change({ mark: 'added', parts: ['C9'] }),
    change({ mark: 'removed', parts: ['C3'] }),
    change({ mark: 'moved', group: 'wiring', parts: ['C1'], joint: { before: 'j1', after: 'j2' } }),
    change({}),
    change({ mark: 'removed', group: 'wiring', parts: [], joint: { before: 'j3', after: null } }),
  ]

  it('shows in each state only what that state has', () => {
    const [before, after] = [litMarks(changes, 'before'), litMarks(changes, 'after')]
    expect([...before.parts]).toEqual([
      ['C3', 'removed'],
      ['C1', 'moved'],
    ])
    expect([...after.parts]).toEqual([
      ['C9', 'added'],
      ['C1', 'moved'],
    ])
    expect([[...before.joints], [...after.joints]]).toEqual([
      [
        ['j1', 'moved'],
        ['j3', 'removed'],
      ],
      [['j2', 'moved']],
    ])
  })
})

it('changes stand under their headings, empty ones left out', () => {
  const groups = groupChanges([change({ group: 'wiring' }), change({}), change({ group: 'wiring', text: 'second' })])
  expect(groups.map(({ title, changes }) => [title, changes.length])).toEqual([
    ['Parts', 1],
    ['Wiring', 2],
  ])
})

it('revisions stand under their days', () => {
  const at = (savedAt: string) => ({ savedAt }) as Revision
  const now = new Date(2026, 11, 1, 12)
  const iso = (day: number, hour: number) => new Date(2026, 10, day, hour).toISOString()
  const days = byDay([at(now.toISOString()), at(iso(30, 23)), at(iso(30, 1)), at(iso(12, 9))], now, 'en-GB')
  expect(days.map(({ title, revisions }) => [title, revisions.length])).toEqual([
    ['Today, 1 December 2026', 1],
    ['Yesterday, 30 November 2026', 2],
    ['12 November 2026', 1],
  ])
})

describe('a margin', () => {
  const side = { moment: 'cold-start', load: 6, limit: 4.5, margin: -1.5, about: true } as const
  const row = (before: MarginChange['before'], after: MarginChange['after']): MarginChange => ({
    kind: 'contact',
    name: 'W1 in, 12 V',
    unit: 'A',
    subject: { kind: 'joint' },
    before,
    after,
  })

  it('is read with its load, limit and moment', () => {
    expect(loadWords(side, 'A')).toBe('about 6.0 of 4.5 A at cold start')
    expect(loadWords({ ...side, load: 11.62, limit: 11.4, margin: 0.22, about: false }, 'V')).toBe(
      '11.62 V, at least 11.40, at cold start',
    )
    expect(loadWords(null, 'A')).toBe('not there')
    expect([marginText(side, 'A'), marginText({ ...side, margin: 2 }, 'W')]).toEqual(['−1.5 A', '+2 W'])
  })

  it('says which way it went', () => {
    const more = { ...side, margin: 1 }
    expect([row(null, side), row(side, null), row(side, more), row(more, side)].map(wayOf)).toEqual([
      'new',
      'gone',
      'better',
      'worse',
    ])
  })
})
