import { afterEach, describe, expect, it, vi } from 'vitest'
import { makeApp } from '../helpers/mountPage.ts'
import { fakeServer, irma, json, sessionOf } from '../helpers/fakeServer.ts'

afterEach(() => vi.unstubAllGlobals())

describe('the guard', () => {
  it('takes a visitor to sign in and remembers where they wanted to go', async () => {
    const server = fakeServer({ 'GET /api/session': json(sessionOf(null)) })
    const { router } = makeApp()
    await router.push('/account')
    expect(router.currentRoute.value).toMatchObject({ name: 'sign-in', query: { next: '/account' } })
    await router.push('/catalog')
    expect(router.currentRoute.value.name).toBe('catalog')
    expect(server.seen).toHaveLength(1)
  })

  it('lets a member in and titles the window', async () => {
    fakeServer({ 'GET /api/session': json(sessionOf(irma)) })
    const { router } = makeApp()
    await router.push('/account')
    expect(router.currentRoute.value.name).toBe('account')
    expect(document.title).toBe('Account · Bayloom')
    await router.push('/users')
    expect(router.currentRoute.value.name).toBe('not-found')
  })
})
