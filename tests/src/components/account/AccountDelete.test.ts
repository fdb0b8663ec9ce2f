import { flushPromises } from '@vue/test-utils'
import { describe, expect, it, vi } from 'vitest'
import AccountDelete from '../../../../src/components/account/AccountDelete.vue'
import { fakeServer, irma, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const show = async (leaving: object, deleted = json(null, 204)) => {
  const server = fakeServer({
    'GET /api/session': json(sessionOf(irma)),
    'GET /api/account/leaving': json(leaving),
    'DELETE /api/account': deleted,
  })
  const { wrapper } = await mountPage(AccountDelete)
  await wrapper.get('button').trigger('click')
  await flushPromises()
  await flushPromises()
  return server
}

describe('deleting an account', () => {
  it('leads to the builds that have to be handed over, and asks for no password before', async () => {
    await show({ toHandOver: [{ id: 'b1', name: 'North room', others: 2 }], toDelete: [], toLeave: 0 })
    expect(words()).toContain('Hand them over first')
    expect(words()).toContain('North room, 2 other members')
    expect(document.querySelector('a')?.getAttribute('href')).toBe('/builds/b1/people')
    expect(document.querySelector('input')).toBeNull()
  })

  it('says what goes and what stays, and shows a wrong password at its field', async () => {
    const refused = problem('bad-input', { errors: [{ path: 'password', message: 'this is not your password' }] })
    const leaving = { toHandOver: [], toDelete: [{ id: 'b2', name: 'Shelf', others: 0 }], toLeave: 1 }
    const server = await show(leaving, refused)
    expect(words()).toContain('because nobody else is in them: Shelf.')
    expect(words()).toContain('Builds of others stay as they are: 1.')
    const assign = vi.fn()
    vi.stubGlobal('location', { ...window.location, assign })
    const input = document.querySelector('input')!
    input.value = 'not mine at all'
    input.dispatchEvent(new Event('input'))
    document.querySelector('form')!.dispatchEvent(new Event('submit', { cancelable: true }))
    await flushPromises()
    await flushPromises()
    expect(server.of('DELETE', '/api/account').at(-1)?.body).toEqual({ password: 'not mine at all' })
    expect(words()).toContain('This is not your password')
    expect(assign).not.toHaveBeenCalled()
  })
})
