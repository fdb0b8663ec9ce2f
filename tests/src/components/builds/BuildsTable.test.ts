import { describe, expect, it } from 'vitest'
import type { BuildSummary } from '#shared/contract/build.ts'
import BuildsTable from '../../../../src/components/builds/BuildsTable.vue'
import { fakeServer, irma, json, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const build: BuildSummary = {
  id: 'b1',
  name: 'North room',
  machine: 'RV-N-01',
  revision: 14,
  drives: 11,
  parts: 40,
  worst: 'fault',
  checked: true,
  counts: { danger: 0, fault: 3, caution: 1, note: 4 },
  changedAt: new Date().toISOString(),
  changedBy: 'Teo Marchetti',
  archived: false,
  role: 'owner',
  people: [
    { name: 'Irma Solberg', role: 'owner' },
    { name: 'Teo Marchetti', role: 'editor' },
  ],
  review: { approval: null, open: null },
}

const show = async (more: Partial<BuildSummary> = {}) => {
  fakeServer({ 'GET /api/session': json(sessionOf(irma)) })
  const { wrapper } = await mountPage(BuildsTable, {
    builds: [{ ...build, ...more }],
    caption: 'Builds',
    sort: 'changed',
  })
  return wrapper
}

describe('the list of builds', () => {
  it('tells name, machine, state in words, drives, last change and people', async () => {
    const row = words((await show()).get('tbody tr').element)
    for (const told of ['North room', 'RV-N-01', '3 faults', '1 caution, 4 notes', '11', 'Teo Marchetti, revision 14'])
      expect(row).toContain(told)
    expect(row).toContain('Irma Solberg and 1 more')
  })

  it('says that an empty sheet is empty, not that it is within limits', async () => {
    const none = { danger: 0, fault: 0, caution: 0, note: 0 }
    expect((await show({ parts: 0, worst: null, counts: none })).get('.state').text()).toBe('nothing drawn yet')
    expect((await show({ worst: null, counts: none })).get('td.state').text()).toBe('within the stated limits')
  })

  it('shows an approval with its revision, and that it lapsed', async () => {
    const by = [{ name: 'Noor Castellan', guest: false }]
    const approval = { round: 1, revision: 12, by, at: build.changedAt, lapsedRevision: null }
    const state = async (review: BuildSummary['review']) => (await show({ review })).get('td.state').text()
    expect(await state({ approval, open: null })).toContain('approved at revision 12')
    expect(await state({ approval: { ...approval, lapsedRevision: 14 }, open: null })).toContain(
      'approval of revision 12 lapsed',
    )
    const open = { round: 2, revision: 14, changesAsked: true }
    expect(await state({ approval: null, open })).toContain('changes asked, round 2, revision 14')
    expect(await state({ approval: null, open: null })).not.toContain('revision')
  })

  it('marks the column it is sorted by and sorts by another on a press', async () => {
    const wrapper = await show()
    expect(wrapper.findAll('th[aria-sort]').map((head) => [head.text(), head.attributes('aria-sort')])).toEqual([
      ['Last change', 'descending'],
    ])
    await wrapper.findAll('thead button')[0]!.trigger('click')
    expect(wrapper.emitted('update:sort')).toEqual([['name']])
  })
})
