import { flushPromises } from '@vue/test-utils'
import { describe, expect, it, vi } from 'vitest'
import LinkView from '../../../../src/views/LinkView.vue'
import { useSessionStore } from '../../../../src/stores/session.ts'
import { fakeServer, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const link = {
  kind: 'review',
  needsPassPhrase: false,
  expiresAt: '2027-01-01T10:00:00.000Z',
  buildName: 'North room',
  madeBy: 'Irma Solberg',
  inside: null,
}
const guest = { id: 'g1', name: 'Jo', right: 'review', buildId: 'b1', buildName: 'North room' } as const

const show = async (about: object = link, joined = json({ buildId: 'b1' }, 201)) => {
  const server = fakeServer({
    'GET /api/session': [json(sessionOf(null)), json({ ...sessionOf(null), guest })],
    'GET /api/links/token': about instanceof Response ? about : json(about),
    'POST /api/links/token/guests': joined,
  })
  const page = await mountPage(LinkView, { token: 'token' })
  await flushPromises()
  const send = async () => {
    await page.wrapper.get('form').trigger('submit')
    await flushPromises()
    await flushPromises()
  }
  return { ...page, server, send }
}

describe('the arrival by a link', () => {
  it('says what it is, who sent it, and what it lets one do', async () => {
    await show()
    expect(words()).toContain('North room')
    expect(words()).toContain('Irma Solberg shows you the wiring plan of a storage server and asks for your eye')
    expect(words()).toContain('comment, and give a verdict')
    expect(words()).toContain('You need no account')
    expect(words()).not.toContain('Pass phrase')
  })

  it('asks for a name, then opens the build as that guest', async () => {
    const { wrapper, server, router, send } = await show()
    const replace = vi.spyOn(router, 'replace').mockResolvedValue(undefined)
    await send()
    expect(words()).toContain('Write a name')
    await wrapper.get('input[name="name"]').setValue('Jo')
    await send()
    expect(server.of('POST', '/api/links/token/guests')[0]?.body).toEqual({ name: 'Jo' })
    expect(replace).toHaveBeenCalledWith({ name: 'build', params: { buildId: 'b1' }, query: { show: 'review' } })
    expect(useSessionStore().guest).toMatchObject({ name: 'Jo', buildId: 'b1' })
  })

  it('asks for the pass phrase before it names the build, and says where it does not match', async () => {
    const refused = problem('wrong-credentials', { detail: 'The pass phrase does not match.' })
    const { wrapper, send } = await show({ ...link, needsPassPhrase: true, buildName: null, madeBy: null }, refused)
    expect(words()).toContain('A build is shown to you')
    await wrapper.get('input[name="name"]').setValue('Jo')
    await wrapper.get('input[name="passPhrase"]').setValue('a wrong one')
    await send()
    expect(words()).toContain('The pass phrase does not match.')
  })

  it('goes on at once for who is inside already', async () => {
    const { wrapper } = await show({ ...link, inside: { buildId: 'b1', as: 'guest', name: 'Jo' } })
    expect(words()).toContain('You are in this build already, as the guest Jo.')
    expect(wrapper.find('form').exists()).toBe(false)
    expect(wrapper.get('a[href="/builds/b1?show=review"]').text()).toBe('Open the build')
  })

  it('that is over says whom to ask', async () => {
    await show(problem('link-expired'))
    expect(words()).toContain('This link does not open')
    expect(words()).toContain('Ask the person who sent it for a new one')
  })
})
