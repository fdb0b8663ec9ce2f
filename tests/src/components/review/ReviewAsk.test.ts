import { flushPromises } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import ReviewAsk from '../../../../src/components/review/ReviewAsk.vue'
import { fakeServer, irma, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'
import { roundOf } from './fixtures.ts'

const noor = '11111111-1111-4111-8111-111111111111'
const member = (id: string, name: string, role: string) => ({ user: { id, name, email: `${id}@example.org` }, role })
const members = [member('u1', 'Irma Solberg', 'owner'), member(noor, 'Noor Castellan', 'reviewer')]
const asked = (token: string | null) => json({ round: roundOf(), token }, 201)

const show = async (answer = asked(null), props = {}) => {
  const server = fakeServer({
    'GET /api/session': json(sessionOf(irma)),
    'GET /api/builds/b1/members': json({
      members: [...members, member('u3', 'Wim Achterberg', 'reader')],
      invitations: [],
    }),
    'GET /api/builds/b1/rounds': json({ rules: roundOf().rules, rounds: [] }),
    'POST /api/builds/b1/rounds': answer,
  })
  const state = { kind: 'saved', revision: 12 }
  const common = { buildId: 'b1', isOwner: true, state, number: 2, revision: 12 }
  const page = await mountPage(ReviewAsk, { open: false, ...common, ...props })
  await page.wrapper.setProps({ open: true })
  await flushPromises()
  const sent = () => server.of('POST', '/api/builds/b1/rounds').map(({ body }) => body)
  return { ...page, sent }
}

const element = <T extends Element>(selector: string, label?: string): T => {
  const all = [...document.querySelectorAll<T>(selector)]
  const found = label === undefined ? all[0] : all.find((one) => one.textContent?.includes(label))
  if (!found) throw new Error(`no ${selector} ${label ?? ''}`)
  return found
}
const tick = (label: string) => element<HTMLLabelElement>('label', label).querySelector('input')?.click()
const field = (label: string): HTMLInputElement => {
  const id = element<HTMLLabelElement>('label', label).htmlFor
  return document.getElementById(id) as HTMLInputElement
}
async function fill(label: string, text: string): Promise<void> {
  const input = field(label)
  input.value = text
  input.dispatchEvent(new Event('input'))
  await flushPromises()
}
async function ask(): Promise<void> {
  element<HTMLFormElement>('#ask-round').dispatchEvent(new Event('submit', { cancelable: true }))
  await flushPromises()
}

describe('asking for a round', () => {
  it('offers those who may judge, but not oneself and not readers', async () => {
    await show()
    const offered = element('fieldset').textContent ?? ''
    expect(offered).toContain('Noor Castellan')
    expect(offered).not.toContain('Irma')
    expect(offered).not.toContain('Wim')
  })

  it('asks nobody before somebody is named', async () => {
    const { sent } = await show()
    await ask()
    expect(words()).toContain('Name somebody, or let anybody come with a link')
    expect(sent()).toEqual([])
  })

  it('sends question, people and addresses, about the revision that is saved', async () => {
    const { sent } = await show()
    await fill('Your question', 'Does lead 1 hold?')
    tick('Noor Castellan')
    await fill('Others by e-mail', 'a@example.org, b@example.org')
    await ask()
    expect(sent()).toEqual([
      {
        revision: 12,
        question: 'Does lead 1 hold?',
        reviewers: [noor],
        invite: ['a@example.org', 'b@example.org'],
      },
    ])
  })

  it('names an address that is none', async () => {
    const { sent } = await show()
    await fill('Others by e-mail', 'a@example.org nobody')
    await ask()
    expect(words()).toContain('"nobody" is no e-mail address.')
    expect(sent()).toEqual([])
  })

  it('shows the address of the link this once', async () => {
    const { sent } = await show(asked('t'.repeat(43)))
    tick('Anybody with a link')
    await flushPromises()
    await ask()
    expect(sent()).toMatchObject([{ reviewers: [], link: { days: 14 } }])
    expect(field('Address of the link').value).toBe(`${location.origin}/links/${'t'.repeat(43)}`)
  })

  it('waits until everything is saved', async () => {
    await show(asked(null), { state: { kind: 'saving', revision: 12 } })
    expect(words()).toContain('Some changes are not saved yet')
    expect(element<HTMLButtonElement>('button[form="ask-round"]').disabled).toBe(true)
  })

  it('leaves links and invitations to owners', async () => {
    await show(asked(null), { isOwner: false })
    expect(words()).not.toContain('Anybody with a link')
    expect(words()).not.toContain('Others by e-mail')
  })

  it('says why it is refused and keeps what was typed', async () => {
    await show(problem('bad-input', { errors: [{ path: 'reviewers[0]', message: 'this person is not in the build' }] }))
    await fill('Your question', 'Does lead 1 hold?')
    tick('Noor Castellan')
    await ask()
    expect(words()).toContain('this person is not in the build')
    expect(field('Your question').value).toBe('Does lead 1 hold?')
  })
})
