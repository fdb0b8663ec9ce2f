import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { problemSchema } from '#shared/contract/problems.ts'
import { sessionSchema } from '#shared/contract/session.ts'
import { RefreshToken, Session, User } from '../../server/models/index.ts'
import { hashToken } from '../../server/services/tokens.ts'
import { makeClient, startApi, testPassword, type Api, type Client } from './support/api.ts'

let api: Api
beforeAll(async () => {
  api = await startApi()
})
afterAll(() => api.close())

const code = (response: { body: unknown }) => problemSchema.parse(response.body).code

describe('the first account', () => {
  test('of two that register at the same moment, one becomes administrator', async () => {
    const [one, two] = await Promise.all([api.visitor(), api.visitor()])
    expect(sessionSchema.parse((await one.get('/api/session')).body).firstAccount).toBe(true)
    const answers = await Promise.all(
      [one, two].map((client, i) =>
        client.post('/api/accounts', {
          email: `first${i}@example.org`,
          name: 'First',
          password: 'a reel of leader tape',
        }),
      ),
    )
    expect(answers.map((answer) => answer.status)).toEqual([201, 201])
    const roles = answers.map((answer) => sessionSchema.parse(answer.body).user?.role).sort()
    expect(roles).toEqual(['administrator', 'member'])
    const later = await api.visitor()
    expect(sessionSchema.parse((await later.get('/api/session')).body).firstAccount).toBe(false)
  })
})

describe('registering', () => {
  const register = async (fields: Record<string, unknown>) =>
    (await api.visitor()).post('/api/accounts', {
      email: 'new@example.org',
      name: 'New',
      password: 'a reel of leader tape',
      ...fields,
    })

  test.each([
    ['too short', { password: 'short one' }, 'password'],
    ['common', { password: 'Password1234' }, 'password'],
    ['the e-mail address', { password: 'new@example.org' }, 'password'],
    ['one character again and again', { password: 'aaaaaaaaaaaaaaa' }, 'password'],
    ['a run along the keyboard', { password: 'qwertyuiopasdf' }, 'password'],
    ['not an address', { email: 'nobody' }, 'email'],
    ['no name', { name: '  ' }, 'name'],
  ])('refuses what is %s', async (_what, fields, path) => {
    const response = await register(fields)
    expect(response.status).toBe(400)
    expect(problemSchema.parse(response.body).errors?.map((error) => error.path)).toEqual([path])
  })

  test('refuses an unknown field by its name', async () => {
    const response = await register({ role: 'administrator' })
    expect(problemSchema.parse(response.body).errors).toEqual([{ path: 'role', message: 'unknown field' }])
  })

  test('takes an address once, however it is written', async () => {
    expect((await register({ email: 'Twice@Example.org' })).status).toBe(201)
    const again = await register({ email: ' twice@example.ORG' })
    expect([again.status, code(again)]).toEqual([409, 'already-there'])
  })

  test('keeps no password as it was written', async () => {
    const user = await User.findOne({ where: { email: 'twice@example.org' } })
    expect(user?.passwordHash).toMatch(/^\$argon2id\$v=19\$m=65536,p=4,t=3\$|^\$argon2id\$v=19\$m=65536,t=3,p=4\$/)
  })
})

describe('signing in', () => {
  test('opens a session in cookies that no script reads and no other site sends', async () => {
    const { user } = await api.person({ email: 'in@example.org' })
    const visitor = await api.visitor()
    const response = await visitor.post('/api/session', { email: 'in@example.org', password: testPassword })
    expect(response.status).toBe(200)
    expect(sessionSchema.parse(response.body).user?.id).toBe(user?.id)
    const cookies = (response.headers as unknown as { 'set-cookie': string[] })['set-cookie']
    expect(cookies).toHaveLength(2)
    for (const cookie of cookies) expect(cookie).toMatch(/HttpOnly; SameSite=Strict/)
    expect(JSON.stringify(response.body)).not.toContain(visitor.cookies.get('bayloom-refresh'))
  })

  test('answers the same for a wrong password, no account and a disabled one', async () => {
    const { user } = await api.person({ email: 'gone@example.org' })
    await user?.update({ disabledAt: new Date() })
    const tries = [
      { email: 'in@example.org', password: 'not the password' },
      { email: 'nobody@example.org', password: 'not the password' },
      { email: 'gone@example.org', password: testPassword },
    ]
    const answers = await Promise.all(tries.map(async (body) => (await api.visitor()).post('/api/session', body)))
    for (const answer of answers) {
      expect(answer.status).toBe(401)
      expect(answer.body).toEqual(answers[0]?.body)
    }
    expect(code(answers[0] ?? { body: null })).toBe('wrong-credentials')
  })

  test('ends the session that the browser had before', async () => {
    const client = await api.person({ email: 'anew@example.org' })
    const before = client.cookies.get('bayloom-refresh') ?? ''
    await client.post('/api/session', { email: 'anew@example.org', password: testPassword })
    const token = await RefreshToken.findByPk(hashToken(before))
    expect((await Session.findByPk(token?.sessionId))?.revokedBecause).toBe('signed in anew')
  })
})

test('signing out ends the session for every copy of its cookies', async () => {
  const client = await api.person()
  const copy = makeClient(api.url)
  client.cookies.forEach((value, name) => copy.cookies.set(name, value))
  expect((await copy.get('/api/builds')).status).toBe(200)
  expect((await client.delete('/api/session')).status).toBe(204)
  expect(client.cookies.size).toBe(0)
  const refused = await copy.get('/api/builds')
  expect([refused.status, code(refused)]).toEqual([401, 'not-signed-in'])
})

describe('renewing', () => {
  const withoutAccess = (client: Client): Client => {
    const copy = makeClient(api.url)
    copy.cookies.set('bayloom-refresh', client.cookies.get('bayloom-refresh') ?? '')
    return copy
  }

  test('a run-out access token is renewed on the way, and the token against forged requests stays', async () => {
    const client = await api.person()
    const before = client.cookies.get('bayloom-refresh')
    client.cookies.delete('bayloom-access')
    expect((await client.get('/api/builds')).status).toBe(200)
    expect(client.cookies.get('bayloom-access')).toBeDefined()
    expect(client.cookies.get('bayloom-refresh')).not.toBe(before)
    expect((await client.patch('/api/account', { name: 'Renamed' })).status).toBe(200)
  })

  test('tabs that renew at the same moment all stay signed in', async () => {
    const client = await api.person()
    const tabs = Array.from({ length: 5 }, () => withoutAccess(client))
    const answers = await Promise.all(tabs.map((tab) => tab.get('/api/builds')))
    expect(answers.map((answer) => answer.status)).toEqual([200, 200, 200, 200, 200])
    expect(
      tabs.filter((tab) => tab.cookies.get('bayloom-refresh') !== client.cookies.get('bayloom-refresh')),
    ).toHaveLength(1)
  })

  test('an old token used again later ends the whole session, the thief’s and the owner’s', async () => {
    const client = await api.person()
    const thief = withoutAccess(client)
    client.cookies.delete('bayloom-access')
    await client.get('/api/builds')
    await RefreshToken.update(
      { replacedAt: new Date(Date.now() - 60_000) },
      { where: { tokenHash: hashToken(thief.cookies.get('bayloom-refresh') ?? '') } },
    )
    expect((await thief.get('/api/builds')).status).toBe(401)
    expect((await client.get('/api/builds')).status).toBe(401)
    client.cookies.delete('bayloom-access')
    expect((await client.get('/api/builds')).status).toBe(401)
  })

  test('nothing is renewed past the end of the token or of the session', async () => {
    const [one, two] = [await api.person(), await api.person()]
    const past = new Date(Date.now() - 1000)
    await RefreshToken.update(
      { expiresAt: past },
      { where: { tokenHash: hashToken(one.cookies.get('bayloom-refresh') ?? '') } },
    )
    await Session.update({ expiresAt: past }, { where: { userId: two.user?.id ?? '' } })
    expect((await withoutAccess(one).get('/api/builds')).status).toBe(401)
    expect((await withoutAccess(two).get('/api/builds')).status).toBe(401)
    expect((await two.get('/api/builds')).status).toBe(401)
  })

  test('a token made with another key or without one is worth nothing', async () => {
    const client = makeClient(api.url)
    const part = (value: object) => Buffer.from(JSON.stringify(value)).toString('base64url')
    const { user } = await api.person()
    const session = await Session.findOne({ where: { userId: user?.id ?? '' } })
    client.cookies.set(
      'bayloom-access',
      `${part({ alg: 'none', typ: 'JWT' })}.${part({ sid: session?.id, iss: 'bayloom', aud: 'bayloom', exp: 9e9 })}.`,
    )
    expect((await client.get('/api/builds')).status).toBe(401)
  })

  test('the database holds no refresh token that could be used', async () => {
    const client = await api.person()
    const token = client.cookies.get('bayloom-refresh') ?? 'none'
    const rows = await RefreshToken.findAll()
    expect(rows.length).toBeGreaterThan(0)
    expect(JSON.stringify(rows)).not.toContain(token)
  })
})

describe('changing the password', () => {
  test('ends the other sessions and keeps this one', async () => {
    const client = await api.person({ email: 'change@example.org' })
    const other = await api.browserOf(client.user as User)
    const next = 'splice the second reel'
    expect((await client.put('/api/account/password', { current: testPassword, next })).status).toBe(204)
    expect((await client.get('/api/builds')).status).toBe(200)
    expect((await other.get('/api/builds')).status).toBe(401)
    const visitor = await api.visitor()
    expect((await visitor.post('/api/session', { email: 'change@example.org', password: testPassword })).status).toBe(
      401,
    )
    expect((await visitor.post('/api/session', { email: 'change@example.org', password: next })).status).toBe(200)
  })

  test('asks for the current one', async () => {
    const client = await api.person()
    const response = await client.put('/api/account/password', { current: 'no', next: 'splice the second reel' })
    expect(problemSchema.parse(response.body).errors?.[0]?.path).toBe('current')
  })
})
