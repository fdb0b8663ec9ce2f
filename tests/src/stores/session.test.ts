import { createPinia, setActivePinia } from 'pinia'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { useSessionStore } from '../../../src/stores/session.ts'
import { fakeServer, irma, json, sessionOf } from '../helpers/fakeServer.ts'

beforeEach(() => setActivePinia(createPinia()))
afterEach(() => vi.unstubAllGlobals())

describe('the session', () => {
  it('is asked for once', async () => {
    const server = fakeServer({ 'GET /api/session': json(sessionOf(irma)) })
    const session = useSessionStore()
    await session.ensure()
    await session.ensure()
    expect(session.user?.name).toBe('Irma Solberg')
    expect(server.seen).toHaveLength(1)
  })

  it('knows who edits the catalog', async () => {
    for (const [role, edits] of [
      ['member', false],
      ['catalog-editor', true],
      ['administrator', true],
    ] as const) {
      setActivePinia(createPinia())
      fakeServer({ 'GET /api/session': json(sessionOf({ ...irma, role })) })
      const session = useSessionStore()
      await session.load()
      expect([role, session.editsCatalog]).toEqual([role, edits])
    }
  })
})

describe('a session that ended under the page', () => {
  async function signedIn() {
    fakeServer({ 'GET /api/session': json(sessionOf(irma)), 'POST /api/session': json(sessionOf(irma, 'token-2')) })
    const session = useSessionStore()
    await session.load()
    return session
  }

  it('is asked about once for all requests refused meanwhile', async () => {
    const session = await signedIn()
    const answers = [session.signInAgain(), session.signInAgain()]
    expect(session.asksAgain).toBe(true)
    await session.signIn(irma.email, 'splice-and-rewind-7')
    expect(await Promise.all(answers)).toEqual([true, true])
    expect([session.asksAgain, session.hasEnded, session.session?.csrfToken]).toEqual([false, false, 'token-2'])
  })

  it('is not asked about again once it was declined, until the person wants to', async () => {
    const session = await signedIn()
    const first = session.signInAgain()
    session.settleAgain(false)
    expect(await first).toBe(false)
    expect(session.hasEnded).toBe(true)
    expect(await session.signInAgain()).toBe(false)
    expect(session.asksAgain).toBe(false)
    void session.askAgain()
    expect(session.asksAgain).toBe(true)
  })

  it('never asks somebody who was not signed in', async () => {
    fakeServer({ 'GET /api/session': json(sessionOf(null)) })
    const session = useSessionStore()
    await session.load()
    expect(await session.signInAgain()).toBe(false)
    expect(session.hasEnded).toBe(false)
  })
})
