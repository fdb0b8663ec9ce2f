import { describe, expect, it } from 'vitest'
import type { LedgerRow } from '#shared/check/result.ts'
import { groupFindings } from '../../../src/diagram/findingGroups.ts'
import { jointGroups } from '../../../src/diagram/jointGroups.ts'
import { worstRows } from '../../../src/diagram/ledgerRows.ts'
import { searchShelf, shelfGroups } from '../../../src/diagram/shelf.ts'
import { buildOf, looseParts, smallCatalog } from '../../shared/build/edits/smallShop.ts'

const build = buildOf({
  ...looseParts,
  joints: [{ id: 'j1', a: { part: 'w', connector: 'out-2' }, b: { part: 'c2', connector: 'plug' } }],
})

describe('joints in words', () => {
  it('lists bays in their order, then the other parts', () => {
    const titles = jointGroups(build, { search: '', onlyFree: false }).map((group) => group.title)
    expect(titles).toEqual(['Bay 01: C1', 'Bay 02: C2', 'Bay 03: C3', 'T1', 'W1', 'W2'])
  })

  it('finds a joint from either end', () => {
    const found = jointGroups(build, { search: 'w1.2', onlyFree: false })
    expect(found.map((group) => group.title)).toEqual(['Bay 02: C2', 'W1'])
    expect(jointGroups(build, { search: 'bay 2', onlyFree: false })[0]?.title).toBe('Bay 02: C2')
  })

  it('shows only what is free', () => {
    const lead = jointGroups(build, { search: '', onlyFree: true }).find((group) => group.title === 'W1')
    expect(lead?.lines.map((line) => line.connector.connector.id)).toEqual(['supply', 'out-1', 'out-3', 'out-4'])
  })
})

describe('the shelf', () => {
  const groups = shelfGroups(smallCatalog, [], [])
  it('begins with the case and holds every model once', () => {
    expect(groups[0]?.items.map((item) => item.model.id)).toEqual(['box'])
    expect(groups.flatMap((group) => group.items)).toHaveLength(smallCatalog.models.size)
  })

  it('finds by all words, in any order', () => {
    expect(searchShelf(groups, 'outlets lead').map((group) => group.items.map((item) => item.model.id))).toEqual([
      ['lead-4'],
    ])
    expect(searchShelf(groups, 'no such thing')).toEqual([])
  })

  it("puts one's own models first", () => {
    const own = smallCatalog.models.get('disk-25')
    if (!own) throw new Error('no model')
    const drives = shelfGroups(smallCatalog, [], [{ ...own, id: 'zz-own', name: 'zz' }]).find((g) => g.kind === 'drive')
    expect(drives?.items.map((item) => [item.model.id, item.own])).toEqual([
      ['zz-own', 'library'],
      ['disk-25', null],
      ['disk-35', null],
    ])
  })
})

describe('the ledger', () => {
  const row = (moment: LedgerRow['moment'], share: number): LedgerRow => ({
    subject: { kind: 'joint', joint: 'j1' },
    kind: 'contact',
    name: 'W1 in, 12 V',
    rail: '12V',
    moment,
    load: share,
    limit: 1,
    unit: 'A',
    margin: 1 - share,
    share,
    shortTime: false,
    about: false,
  })

  it('has each thing once, at its worst or at the moment asked for', () => {
    const rows = [row('at-rest', 0.2), row('cold-start', 0.9), row('full-scan', 0.4)]
    expect(worstRows(rows, null).map((one) => one.moment)).toEqual(['cold-start'])
    expect(worstRows(rows, 'full-scan').map((one) => one.share)).toEqual([0.4])
  })

  it('puts a voltage near its lowest before one with room', () => {
    const volt = (name: string, load: number): LedgerRow => ({
      ...row('cold-start', 0),
      kind: 'device',
      name,
      unit: 'V',
      load,
      limit: 11.4,
      margin: load - 11.4,
      share: null,
    })
    expect(worstRows([volt('C1', 11.9), volt('C2', 11.3)], null).map((one) => one.name)).toEqual(['C2', 'C1'])
  })
})

describe('findings', () => {
  it('stand by severity, then together by rule', () => {
    const one = (rule: string, severity: 'fault' | 'note', ref: string) => ({
      key: `${rule}${ref}`,
      rule,
      severity,
      subjects: [{ kind: 'part' as const, part: ref, ref }],
      message: '',
      why: '',
      remedy: '',
      source: [],
      decidedBy: [],
      about: false,
    })
    const groups = groupFindings([one('a', 'note', 'C1'), one('b', 'fault', 'C2'), one('b', 'fault', 'C3')])
    expect(groups.map((group) => [group.severity, group.count])).toEqual([
      ['danger', 0],
      ['fault', 2],
      ['caution', 0],
      ['note', 1],
    ])
    expect(groups[1]?.bunches[0]?.refs).toEqual(['C2', 'C3'])
  })
})
