import { pino } from 'pino'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { Message } from '../../server/models/index.ts'
import { startApi, testPassword, type Api } from './support/api.ts'

const lines: string[] = []
let api: Api
beforeAll(async () => {
  const log = pino({ level: 'trace' }, { write: (line: string) => void lines.push(line) })
  api = await startApi({ log })
})
afterAll(() => api.close())

test('says who did what, and holds no password, token, cookie or letter', async () => {
  const person = await api.person({ email: 'logged@example.org' })
  const visitor = await api.visitor()
  await visitor.post('/api/session', { email: 'logged@example.org', password: 'a wrong password' })
  await visitor.post('/api/session', { email: 'logged@example.org', password: testPassword })
  await person.get('/api/users')
  await visitor.refreshToken()
  await visitor.post('/api/password-resets', { email: 'logged@example.org' })
  await api.context.jobs.drain()
  const mail = await Message.findOne()
  const token = /password-resets\/([\w-]+)/.exec(mail?.textBody ?? '')?.[1] ?? ''
  expect(token).not.toBe('')
  await visitor.put(`/api/password-resets/${token}`, { password: 'the projector is warm' })

  const entries = lines.map((line) => JSON.parse(line) as Record<string, unknown>)
  const refusals = entries.filter((entry) => entry['msg'] === 'refused')
  expect(refusals.map(({ code, path, user }) => ({ code, path, user }))).toEqual([
    { code: 'wrong-credentials', path: '/api/session', user: null },
    { code: 'forbidden', path: '/api/users', user: person.user?.id },
  ])
  for (const message of ['signed in', 'password reset'])
    expect(entries.filter((entry) => entry['msg'] === message && entry['user'] === person.user?.id)).not.toEqual([])

  const all = lines.join('')
  const secrets = [testPassword, 'a wrong password', 'the projector is warm', token, visitor.csrfToken]
  for (const secret of [...secrets, ...person.cookies.values(), ...visitor.cookies.values()])
    expect(all).not.toContain(secret)
  expect(all).not.toContain('logged@example.org')
})
