import { afterEach, beforeEach, describe, expect, test } from 'vitest'
import { problemSchema } from '#shared/contract/problems.ts'
import { rateLimits } from '../../server/middleware/rateLimit.ts'
import { startApi, testPassword, type Api } from './support/api.ts'

let api: Api
beforeEach(async () => {
  api = await startApi({ settings: { TRUST_PROXY: '1' } })
})
afterEach(() => api.close())

const from = (address: string) => ({ 'x-forwarded-for': address })
const most = (name: keyof typeof rateLimits, per: string) =>
  rateLimits[name].find((limit) => limit.per === per)?.most ?? NaN

async function times(count: number, work: (i: number) => Promise<{ status: number }>): Promise<number[]> {
  const statuses: number[] = []
  for (let i = 0; i < count; i++) statuses.push((await work(i)).status)
  return statuses
}

describe('signing in', () => {
  test('is stopped for an account after so many wrong passwords, from wherever they come', async () => {
    await api.person({ email: 'target@example.org' })
    const visitor = await api.visitor()
    const limit = most('sign-in', 'account')
    const attempt = (i: number) =>
      visitor.send(
        'post',
        '/api/session',
        { email: 'target@example.org', password: `guess ${i}` },
        from(`198.51.100.${i}`),
      )
    expect(await times(limit, attempt)).toEqual(Array(limit).fill(401))
    const refused = await visitor.send(
      'post',
      '/api/session',
      { email: 'target@example.org', password: testPassword },
      from('203.0.113.9'),
    )
    expect(refused.status).toBe(429)
    const problem = problemSchema.parse(refused.body)
    expect(problem.code).toBe('too-many-requests')
    expect(problem.retryAfter_s).toBeGreaterThan(800)
    expect(refused.headers['retry-after']).toBe(String(problem.retryAfter_s))
    const other = { email: 'somebody-else@example.org', password: 'guess' }
    expect((await visitor.send('post', '/api/session', other, from('203.0.113.9'))).status).toBe(401)
  })

  test('that succeeds does not count', async () => {
    await api.person({ email: 'often@example.org' })
    const limit = most('sign-in', 'account')
    const statuses = await times(limit + 2, async () =>
      (await api.visitor()).post('/api/session', { email: 'often@example.org', password: testPassword }),
    )
    expect(new Set(statuses)).toEqual(new Set([200]))
  })
})

test('asking for resets is stopped for an address, and for an account', async () => {
  const visitor = await api.visitor()
  const ask = (email: string, address: string) => visitor.send('post', '/api/password-resets', { email }, from(address))
  const perAddress = most('ask-reset', 'address')
  const many = await times(perAddress + 1, (i) => ask(`a${i}@example.org`, '198.51.100.1'))
  expect(many).toEqual([...Array(perAddress).fill(202), 429])
  const perAccount = most('ask-reset', 'account')
  const same = await times(perAccount + 1, (i) => ask('same@example.org', `203.0.113.${i}`))
  expect(same).toEqual([...Array(perAccount).fill(202), 429])
})

test('an address of version 6 counts with its whole network', async () => {
  const visitor = await api.visitor()
  const perAddress = most('ask-reset', 'address')
  const statuses = await times(perAddress + 1, (i) =>
    visitor.send('post', '/api/password-resets', { email: `b${i}@example.org` }, from(`2001:db8:1:1::${i}`)),
  )
  expect(statuses.at(-1)).toBe(429)
})

test('inviting is stopped for a person', async () => {
  const owner = await api.person()
  const { id } = (await owner.post('/api/builds', { name: 'X' })).body as { id: string }
  const limit = most('invite', 'account')
  const statuses = await times(limit + 1, (i) =>
    owner.send(
      'post',
      `/api/builds/${id}/invitations`,
      { email: `c${i}@example.org`, role: 'reader' },
      from(`203.0.113.${i}`),
    ),
  )
  expect(statuses).toEqual([...Array(limit).fill(201), 429])
})

test('registering is stopped for an address', async () => {
  const visitor = await api.visitor()
  const limit = most('register', 'address')
  const statuses = await times(limit + 1, (i) =>
    visitor.send(
      'post',
      '/api/accounts',
      { email: `d${i}@example.org`, name: 'D', password: 'password12345' },
      from('198.51.100.7'),
    ),
  )
  expect(statuses).toEqual([...Array(limit).fill(400), 429])
})
