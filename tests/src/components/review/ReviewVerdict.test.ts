import { flushPromises } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import ReviewVerdict from '../../../../src/components/review/ReviewVerdict.vue'
import { fakeServer, irma, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'
import { roundOf } from './fixtures.ts'

const round = roundOf()
const path = `/api/builds/b1/rounds/${round.id}/verdict`
const show = async (answer = json(round), more = {}) => {
  const server = fakeServer({
    'GET /api/session': json(sessionOf(irma)),
    'GET /api/builds/b1/rounds': json({ rules: round.rules, rounds: [round] }),
    [`PUT ${path}`]: answer,
  })
  const { wrapper } = await mountPage(ReviewVerdict, { buildId: 'b1', round: { ...round, ...more } })
  const press = async (label: string) => {
    await wrapper
      .findAll('button')
      .find((button) => button.text() === label)
      ?.trigger('click')
    await flushPromises()
  }
  return { server, wrapper, press }
}

describe('a verdict', () => {
  it('approves without a word', async () => {
    const { server, press } = await show()
    await press('Approve revision 12')
    expect(server.of('PUT', path).map(({ body }) => body)).toEqual([{ verdict: 'approve', summary: '' }])
  })

  it('asks for changes with words only', async () => {
    const { server, wrapper, press } = await show()
    await press('Ask for changes')
    expect(words()).toContain('Say what should change.')
    expect(server.of('PUT', path)).toHaveLength(0)
    await wrapper.get('textarea').setValue('Move C5 to lead 3')
    await press('Ask for changes')
    expect(server.of('PUT', path)[0]?.body).toEqual({ verdict: 'ask-for-changes', summary: 'Move C5 to lead 3' })
  })

  it('starts from what was said before', async () => {
    const by = { kind: 'member', userId: 'u1', name: 'Irma Solberg' } as const
    const mine = { by, verdict: 'approve', summary: 'Seen', givenAt: round.askedAt, mine: true } as const
    const { wrapper } = await show(json(round), { verdicts: [mine] })
    expect((wrapper.get('textarea').element as HTMLTextAreaElement).value).toBe('Seen')
    expect(words()).toContain('Your verdict, to change')
  })

  it('says before that a rule will hold an approval back', async () => {
    await show(json(round), { rules: { approvals: 1, heldBackBy: 'fault', guestsCount: true } })
    expect(words()).toContain('hold an approval back')
  })

  it('keeps the words and says why where it is refused', async () => {
    const { wrapper, press } = await show(problem('conflict', { detail: 'Round 2 is over.' }))
    await wrapper.get('textarea').setValue('Seen')
    await press('Approve revision 12')
    expect(words()).toContain('Round 2 is over.')
    expect((wrapper.get('textarea').element as HTMLTextAreaElement).value).toBe('Seen')
  })
})
