import { describe, expect, it } from 'vitest'
import ReviewRound from '../../../../src/components/review/ReviewRound.vue'
import { fakeServer, irma, json, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'
import { roundOf } from './fixtures.ts'

const show = async (more = {}, props = {}) => {
  fakeServer({ 'GET /api/session': json(sessionOf(irma)) })
  const round = roundOf(more)
  return mountPage(ReviewRound, {
    buildId: 'b1',
    round,
    rules: round.rules,
    newest: 12,
    mayEnd: true,
    pending: false,
    ...props,
  })
}

describe('a round', () => {
  it('names its revision, who asks what, and who has not answered', async () => {
    await show()
    for (const told of [
      'Round 2: revision 12',
      'Irma Solberg asked',
      'Does lead 1 hold?',
      'Waiting for verdicts: 0 of 1 approval so far.',
      'Noor Castellan, anybody with the link',
    ])
      expect(words()).toContain(told)
  })

  it('leads to the revision as it was sent once the build has moved on', async () => {
    const { wrapper } = await show({}, { newest: 15 })
    expect(words()).toContain('The build is at revision 15 by now')
    expect(wrapper.get('a').attributes('href')).toBe('/builds/b1/revisions/12')
  })

  it('lists verdicts with who gave them, guests told apart, and no longer waits for who has spoken', async () => {
    const by = { kind: 'member', userId: 'u2', name: 'Noor Castellan' } as const
    const guest = { kind: 'guest', guestId: 'g1', name: 'Jo' } as const
    const givenAt = '2026-12-01T11:00:00.000Z'
    await show({
      standing: 'changes asked',
      byLink: false,
      verdicts: [
        { by, verdict: 'approve', summary: '', givenAt, mine: false },
        { by: guest, verdict: 'ask-for-changes', summary: 'W1 carries too much', givenAt, mine: true },
      ],
    })
    expect(words()).toContain('Noor Castellan approves')
    expect(words()).toContain('Jo (guest) (you) asks for changes')
    expect(words()).toContain('W1 carries too much')
    expect(words()).toContain('Change your verdict')
    expect(words()).not.toContain('Asked:')
  })

  it('is ended by who may, and withdrawn only after a question', async () => {
    const { wrapper } = await show()
    const press = (label: string) =>
      [...document.querySelectorAll('button')].find((button) => button.textContent?.trim() === label)?.click()
    press('Close round 2')
    expect(wrapper.emitted('end')).toEqual([['closed']])
    press('Withdraw it')
    await wrapper.vm.$nextTick()
    expect(wrapper.emitted('end')).toHaveLength(1)
    press('Withdraw the round')
    expect(wrapper.emitted('end')).toEqual([['closed'], ['withdrawn']])
    expect((await show({}, { mayEnd: false })).wrapper.text()).not.toContain('Close round')
  })
})
