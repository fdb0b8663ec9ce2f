import { afterAll, beforeAll, expect, test } from 'vitest'
import { problemSchema } from '#shared/contract/problems.ts'
import { accountSchema } from '#shared/contract/session.ts'
import { startApi, type Api, type Client } from './support/api.ts'

let api: Api
let administrator: Client
beforeAll(async () => {
  api = await startApi()
  administrator = await api.person({ role: 'administrator', name: 'Zed' })
})
afterAll(() => api.close())

const code = (response: { body: unknown }) => problemSchema.parse(response.body).code
const path = (client: Client) => `/api/users/${client.user?.id}`

test('an administrator sees everybody, by name and without a password', async () => {
  await api.person({ name: 'Anna' })
  const response = await administrator.get('/api/users')
  const accounts = accountSchema.array().parse(response.body)
  expect(accounts.map((account) => account.name)).toEqual(['Anna', 'Zed'])
  expect(response.text).not.toContain('argon2')
})

test('a new role counts at once', async () => {
  const member = await api.person()
  expect((await member.get('/api/users')).status).toBe(403)
  expect((await administrator.patch(path(member), { role: 'administrator' })).status).toBe(200)
  expect((await member.get('/api/users')).status).toBe(200)
  expect((await administrator.patch(path(member), { role: 'member' })).status).toBe(200)
})

test('a disabled account is out at once, and comes back only by signing in', async () => {
  const member = await api.person()
  expect((await administrator.patch(path(member), { disabled: true })).body).toMatchObject({ disabled: true })
  expect((await member.get('/api/builds')).status).toBe(401)
  expect((await administrator.patch(path(member), { disabled: false })).body).toMatchObject({ disabled: false })
  expect((await member.get('/api/builds')).status).toBe(401)
})

test('one administrator stays, whatever two of them do at the same moment', async () => {
  expect(code(await administrator.patch(path(administrator), { role: 'member' }))).toBe('last-administrator')
  expect(code(await administrator.patch(path(administrator), { disabled: true }))).toBe('last-administrator')
  const second = await api.person({ role: 'administrator' })
  const answers = await Promise.all([
    administrator.patch(path(administrator), { role: 'member' }),
    second.patch(path(second), { disabled: true }),
  ])
  expect(answers.map((answer) => answer.status).sort()).toEqual([200, 409])
})
