import { flushPromises } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import SignInForm from '../../../../src/components/account/SignInForm.vue'
import LayoutSignInAgain from '../../../../src/components/layout/LayoutSignInAgain.vue'
import { useSessionStore } from '../../../../src/stores/session.ts'
import { fakeServer, irma, json, problem, sessionOf } from '../../helpers/fakeServer.ts'
import { mountPage, words } from '../../helpers/mountPage.ts'

const signedOut = { 'GET /api/session': json(sessionOf(null)) }

async function tryIt(answer: Response, values = { email: 'Irma@ReelVault.example ', password: 'splice-and-rewind-7' }) {
  const server = fakeServer({ ...signedOut, 'POST /api/session': answer })
  const { wrapper } = await mountPage(SignInForm)
  await wrapper.get('input[name="email"]').setValue(values.email)
  await wrapper.get('input[name="password"]').setValue(values.password)
  await wrapper.get('form').trigger('submit')
  await flushPromises()
  return { wrapper, server }
}

describe('signing in', () => {
  it('sends the address in its plain form and says that it is done', async () => {
    const { wrapper, server } = await tryIt(json(sessionOf(irma)))
    expect(server.of('POST', '/api/session')[0]?.body).toEqual({
      email: 'irma@reelvault.example',
      password: 'splice-and-rewind-7',
    })
    expect(wrapper.emitted('done')).toHaveLength(1)
    expect(useSessionStore().user?.id).toBe('u1')
  })

  it('says what was wrong without saying which of the two, and keeps the address', async () => {
    const { wrapper } = await tryIt(problem('wrong-credentials'))
    expect(words(wrapper.get('[role="alert"]').element)).toBe('E-mail and password do not match')
    expect((wrapper.get('input[name="email"]').element as HTMLInputElement).value).toBe('Irma@ReelVault.example')
    expect(wrapper.emitted('done')).toBeUndefined()
  })

  it('says how long to wait after too many tries', async () => {
    const { wrapper } = await tryIt(problem('too-many-requests', { retryAfter_s: 300 }))
    expect(words(wrapper.get('[role="alert"]').element)).toContain('Try again in 5 minutes.')
  })

  it('asks for an address before anything is sent', async () => {
    const { server } = await tryIt(json(sessionOf(irma)), { email: 'irma', password: '' })
    expect(server.of('POST', '/api/session')).toEqual([])
    expect(words()).toContain('Write an e-mail address')
    expect(words()).toContain('Write your password')
  })

  it('can show the password', async () => {
    fakeServer(signedOut)
    const { wrapper } = await mountPage(SignInForm)
    expect(wrapper.get('input[name="password"]').attributes('type')).toBe('password')
    await wrapper.get('button[aria-label="Show the password"]').trigger('click')
    expect(wrapper.get('input[name="password"]').attributes('type')).toBe('text')
    expect(wrapper.find('button[aria-label="Hide the password"]').exists()).toBe(true)
  })
})

describe('signing in again over the page', () => {
  it('asks the same person for the password only, and settles', async () => {
    const server = fakeServer({
      'GET /api/session': [json(sessionOf(irma)), json(sessionOf(null, 'visitor'))],
      'POST /api/session': [problem('forged-request'), json(sessionOf(irma, 'token-2'))],
    })
    await mountPage(LayoutSignInAgain)
    const answer = useSessionStore().signInAgain()
    await flushPromises()
    const email = document.querySelector<HTMLInputElement>('input[name="email"]')!
    expect([email.value, email.readOnly]).toEqual(['irma@reelvault.example', true])
    const password = document.querySelector<HTMLInputElement>('input[name="password"]')!
    password.value = 'splice-and-rewind-7'
    password.dispatchEvent(new Event('input', { bubbles: true }))
    document.querySelector('form')!.dispatchEvent(new Event('submit', { bubbles: true, cancelable: true }))
    expect(await answer).toBe(true)
    // The ended session's token is worth nothing: the form takes a visitor's one, and the person stays on the page.
    expect(server.of('POST', '/api/session').map((one) => one.csrf)).toEqual(['token-1', 'visitor'])
    expect(useSessionStore().session?.csrfToken).toBe('token-2')
  })

  it('leaves a bar with the way back where it was declined', async () => {
    fakeServer({ 'GET /api/session': json(sessionOf(irma)) })
    await mountPage(LayoutSignInAgain)
    const answer = useSessionStore().signInAgain()
    await flushPromises()
    document.querySelector<HTMLElement>('button[aria-label="Not now"]')!.click()
    expect(await answer).toBe(false)
    await flushPromises()
    expect(words()).toContain('Nothing more is saved until you sign in.')
  })
})
