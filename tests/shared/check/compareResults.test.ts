import { describe, expect, it } from 'vitest'
import { compareMargins } from '#shared/check/compareMargins.ts'
import { compareResults, resultComparisonSchema } from '#shared/check/compareResults.ts'
import { check } from '#shared/check/check.ts'
import type { CheckResult, Finding, LedgerRow } from '#shared/check/result.ts'
import { catalog, documentOf } from '../../helpers/fixtures/build.ts'

const empty = check(documentOf({}), catalog)
const finding = (key: string, more: Partial<Finding> = {}): Finding => ({
  key,
  rule: 'contact-over-rating',
  severity: 'fault',
  subjects: [],
  message: `${key} is over`,
  why: '',
  remedy: '',
  source: [],
  decidedBy: [],
  about: false,
  ...more,
})
const accepted = { reason: 'known', by: 'Ines', on: '2026-11-30' }
const result = (...findings: Finding[]): CheckResult => ({ ...empty, findings })

describe('findings before and after', () => {
  it('are gained, lost and shifted by their keys', () => {
    const compared = compareResults(
      result(finding('a'), finding('b'), finding('c', { message: 'c: 4.0 A' })),
      result(finding('b'), finding('c', { message: 'c: 5.0 A' }), finding('d', { severity: 'caution' }), finding('e')),
    )
    expect(compared.gained.map(({ key }) => key)).toEqual(['e', 'd'])
    expect(compared.lost.map(({ key }) => key)).toEqual(['a'])
    expect(compared.shifted.map(({ before, after }) => [before.message, after.message])).toEqual([
      ['c: 4.0 A', 'c: 5.0 A'],
    ])
    expect(resultComparisonSchema.parse(compared)).toEqual(compared)
  })

  it('count one that somebody accepted as lost, and say so', () => {
    const there = compareResults(result(finding('a')), result(finding('a', { accepted })))
    expect(there.lost).toMatchObject([{ key: 'a', accepted: true }])
    const back = compareResults(result(finding('a', { accepted })), result(finding('a')))
    expect([back.gained.map(({ key }) => key), back.lost]).toEqual([['a'], []])
    const both = compareResults(result(finding('a', { accepted })), result(finding('a', { accepted })))
    expect([both.gained, both.lost, both.shifted]).toEqual([[], [], []])
  })
})

const row = (name: string, load: number, limit: number | null, more: Partial<LedgerRow> = {}): LedgerRow => ({
  subject: { kind: 'part' },
  kind: 'contact',
  name,
  moment: 'cold-start',
  load,
  limit,
  unit: 'A',
  margin: limit === null ? null : limit - load,
  share: limit === null ? null : load / limit,
  shortTime: false,
  about: false,
  ...more,
})

describe('margins before and after', () => {
  it('are those of the worst moment of each row, the least left first', () => {
    const before = [row('W1 in', 2, 6), row('W1 in', 3, 6, { moment: 'full-scan' }), row('W2 in', 1, 6)]
    const after = [row('W1 in', 4, 6), row('W1 in', 1, 6, { moment: 'full-scan' }), row('W2 in', 5, 6)]
    const told = compareMargins(before, after)
    expect(
      told.map(({ name, before, after }) => [name, before?.moment, before?.margin, after?.moment, after?.margin]),
    ).toEqual([
      ['W2 in', 'cold-start', 5, 'cold-start', 1],
      ['W1 in', 'full-scan', 3, 'cold-start', 2],
    ])
  })

  it('leave out what reads the same, has no limit, or is not there', () => {
    expect(compareMargins([row('a', 2, 6), row('b', 2, null)], [row('a', 2.04, 6), row('b', 9, null)])).toEqual([])
    expect(compareMargins([row('a', 2, 6)], [row('a', 2.06, 6)])).toHaveLength(1)
    expect(
      compareMargins([row('gone', 2, 6)], [row('new', 2, 6)]).map(({ name, before, after }) => [name, !before, !after]),
    ).toEqual([
      ['new', true, false],
      ['gone', false, true],
    ])
  })

  it('count a voltage as worst where it is lowest', () => {
    const volts = (load: number, moment: LedgerRow['moment']) =>
      row('C1 12 V', load, 11.4, { unit: 'V', kind: 'device', margin: load - 11.4, moment })
    const [told] = compareMargins([volts(11.9, 'at-rest'), volts(11.6, 'cold-start')], [volts(11.9, 'at-rest')])
    expect([told?.before?.load, told?.after?.load]).toEqual([11.6, 11.9])
  })
})
