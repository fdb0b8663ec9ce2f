import { describe, expect, it } from 'vitest'
import { tableOf } from '#shared/paper/lid/tables.ts'
import { example, lidOf } from './sample.ts'

describe('what a lid sheet says', () => {
  const { content, result } = lidOf(example('north-room'))
  const drive = (ref: string) => content.drives.find((one) => one.ref === ref)

  it('tells which plug feeds a bay and where its data goes, from the far end to the plug', () => {
    expect(drive('C7')).toMatchObject({
      bay: '07',
      serial: 'RVN3T1107',
      tail: '…1107',
      capacity: '3 TB SAS',
      role: 'data',
      power: 'T1 lead 2, outlet 1 > W2 2 > W3 2 > W9 leg 3',
      data: 'K1 slot 1 > K2 port B, lane 2 > W9 leg 3',
    })
    expect(drive('C9')?.data).toBe('K1 SATA 1 > W10')
  })

  it('follows expanders and tells backplane bays; the leads that feed a backplane together stand beside', () => {
    const { drives, feeds } = lidOf(example('projection-24')).content
    expect(drives[0]).toMatchObject({
      power: 'T1 > W3 to W8 > U1 bay 1',
      data: 'K1 slot 2 > K2 port A, lane 0 > W9 > U1 data 1, bay 1',
    })
    expect(feeds).toContainEqual({ inlet: 'U1 power 1', power: 'T1 drives 1 > W3 1' })
  })

  it('says where a way ends that is not whole', () => {
    const wrecked = lidOf(example('salvage')).content
    expect(wrecked.drives.find(({ ref }) => ref === 'C6')).toMatchObject({ power: 'not fed', powerIsOpen: true })
    expect(wrecked.drives.find(({ ref }) => ref === 'C1')?.data).toMatch(/no link, W6 is wired for the other direction/)
  })

  it('gives load, limit and what is left of rails and leads, at start and running', () => {
    const lead = content.budgets.find(({ name }) => name === 'W1 in, 12 V')
    expect(lead?.start?.load).toBeCloseTo(8, 1)
    expect(lead?.start?.limit).toBeCloseTo(4.5, 5)
    expect(lead?.running?.load).toBeLessThan(4.5)
    expect(content.budgets.map(({ name }) => name)).toEqual(expect.arrayContaining(['T1 12V1', 'T1, all rails']))
  })

  it('keeps every open finding; what was accepted stands apart, with who and why', () => {
    expect(content.open).toHaveLength(result.findings.length)
    const { key, severity } = result.findings[0]!
    const accepted = [{ key, severity, reason: 'Starts one by one by hand.', by: 'Noor', on: '2026-11-30' }]
    const again = lidOf({ ...example('north-room'), accepted }).content
    expect(again.accepted).toHaveLength(1)
    expect(again.accepted[0]?.accepted).toBe('Accepted by Noor on 2026-11-30: Starts one by one by hand.')
    expect(again.open).toHaveLength(result.findings.length - 1)
  })

  it('marks a drive without a serial', () => {
    const document = example('north-room')
    const parts = document.parts.map((part) => (part.ref === 'C3' ? { ...part, serial: undefined } : part))
    const bare = lidOf(JSON.parse(JSON.stringify({ ...document, parts })) as typeof document).content
    expect(bare.drives.find(({ ref }) => ref === 'C3')).toMatchObject({ serial: 'not recorded', tail: 'no serial' })
    expect(bare.assumed).toContain('No serial is on record for C3.')
  })

  it('says who starts when', () => {
    expect(content.startGroups).toEqual(['All 10 motors start together: C1 to C10.'])
    const staged = lidOf(example('projection-24')).content.startGroups
    expect(staged.slice(0, 2)).toEqual(['Staged by the controller, every 12 s:', '1. at 0 s: C1 to C4'])
    expect(staged).toHaveLength(7)
  })

  it('mirrors a front seen from the rear, and turns a view from above about', () => {
    const places = (id: string, seenFrom?: 'rear') =>
      new Map(lidOf(example(id), seenFrom ? { seenFrom } : {}).content.maps[0]!.bays.map((bay) => [bay.slot, bay]))
    const front = places('north-room')
    const rear = places('north-room', 'rear')
    expect(rear.get(1)?.column).toBeCloseTo(front.get(9)?.column ?? -1)
    expect(rear.get(1)?.row).toBe(front.get(1)?.row)
    const above = places('stress-60')
    const turned = places('stress-60', 'rear')
    expect(turned.get(60)?.row).toBeCloseTo(above.get(1)?.row ?? -1)
    expect(turned.get(60)?.column).toBeCloseTo(above.get(1)?.column ?? -1)
    expect(lidOf(example('stress-60')).content.maps[0]?.title).toBe('Bays as seen from above')
  })

  it('gives its tables as rows of one width', () => {
    for (const name of ['drives', 'budgets', 'findings'] as const) {
      const table = tableOf(name, content)
      expect(new Set(table.map((row) => row.length)).size).toBe(1)
      expect(table.length).toBeGreaterThan(10)
    }
    expect(tableOf('drives', content)[7]?.slice(0, 3)).toEqual(['07', 'C7', 'RVN3T1107'])
  })
})
