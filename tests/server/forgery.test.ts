import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { problemSchema } from '#shared/contract/problems.ts'
import { makeClient, startApi, testPassword, type Api } from './support/api.ts'

let api: Api
beforeAll(async () => {
  api = await startApi({ settings: { PUBLIC_URL: 'https://plans.example.org', TRUST_PROXY: '1' } })
})
afterAll(() => api.close())

const code = (response: { body: unknown }) => problemSchema.parse(response.body).code
const credentials = { email: 'forged@example.org', password: testPassword }

describe('a change', () => {
  test('without the token is refused, signed in or not', async () => {
    const [visitor, person] = [await api.visitor(), await api.person()]
    visitor.csrfToken = ''
    person.csrfToken = ''
    expect(code(await visitor.post('/api/session', credentials))).toBe('forged-request')
    expect(code(await person.post('/api/builds', { name: 'X' }))).toBe('forged-request')
  })

  test('with somebody else’s token is refused', async () => {
    const [one, two, visitor] = [await api.person(), await api.person(), await api.visitor()]
    one.csrfToken = two.csrfToken
    expect(code(await one.post('/api/builds', { name: 'X' }))).toBe('forged-request')
    one.csrfToken = visitor.csrfToken
    expect(code(await one.post('/api/builds', { name: 'X' }))).toBe('forged-request')
  })

  test('with the token that it had before signing in is refused', async () => {
    await api.person({ email: credentials.email })
    const visitor = await api.visitor()
    expect((await visitor.post('/api/session', credentials)).status).toBe(200)
    expect(code(await visitor.post('/api/builds', { name: 'X' }))).toBe('forged-request')
    await visitor.refreshToken()
    expect((await visitor.post('/api/builds', { name: 'X' })).status).toBe(201)
  })

  test('without any cookie is refused', async () => {
    const bare = makeClient(api.url)
    expect(code(await bare.post('/api/session', credentials))).toBe('forged-request')
  })

  test('after the session ended says so, and not that it was forged', async () => {
    const person = await api.person()
    person.cookies.clear()
    expect(code(await person.post('/api/builds', { name: 'X' }))).toBe('not-signed-in')
  })

  test.each([
    [{ origin: 'https://evil.example' }, 403],
    [{ origin: 'null' }, 403],
    [{ origin: 'https://plans.example.org.evil.example' }, 403],
    [{ 'sec-fetch-site': 'cross-site' }, 403],
    [{ 'sec-fetch-site': 'same-site' }, 403],
    [{ origin: 'https://plans.example.org', 'sec-fetch-site': 'same-origin' }, 201],
  ])('with %j is answered %i', async (headers, status) => {
    const person = await api.person()
    const response = await person.send('post', '/api/builds', { name: 'X' }, headers)
    expect(response.status).toBe(status)
  })
})

test('over https, cookies are Secure and bound to the host', async () => {
  const response = await makeClient(api.url).get('/api/session')
  const [cookie] = (response.headers as unknown as { 'set-cookie': string[] })['set-cookie']
  expect(cookie).toMatch(/^__Host-bayloom-visit=[\w-]{43}; Path=\/; HttpOnly; Secure; SameSite=Strict$/)
  expect(response.headers['strict-transport-security']).toContain('max-age=31536000')
})
