import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { messageSchema } from '#shared/contract/mailbox.ts'
import { problemSchema } from '#shared/contract/problems.ts'
import { Message, PasswordReset } from '../../server/models/index.ts'
import { startApi, testPassword, type Api, type Client } from './support/api.ts'

let api: Api
let visitor: Client
beforeAll(async () => {
  api = await startApi({ settings: { PUBLIC_URL: 'http://plans.example.org' } })
  visitor = await api.visitor()
})
afterAll(() => api.close())

const code = (response: { body: unknown }) => problemSchema.parse(response.body).code
const next = 'the projector is warm'

async function linkFor(email: string): Promise<string> {
  await visitor.post('/api/password-resets', { email })
  await api.context.jobs.drain()
  const mail = await Message.findOne({ where: { recipient: email }, order: [['queuedAt', 'DESC']] })
  const token = /\/password-resets\/([\w-]+)/.exec(mail?.textBody ?? '')?.[1]
  if (!token) throw new Error('no mail with a link was queued')
  return `/api/password-resets/${token}`
}

describe('asking for a reset', () => {
  test('is answered alike for an account and for none, by the same one row', async () => {
    await api.person({ email: 'known@example.org' })
    const answers = [
      await visitor.post('/api/password-resets', { email: 'known@example.org' }),
      await visitor.post('/api/password-resets', { email: 'unknown@example.org' }),
    ]
    for (const answer of answers) expect([answer.status, answer.text]).toEqual([202, ''])
    expect(await Message.count()).toBe(0)
    await api.context.jobs.drain()
    expect((await Message.findAll()).map((message) => message.recipient)).toEqual(['known@example.org'])
  })

  test('sends a mail that an administrator can read in the local mailbox', async () => {
    const administrator = await api.person({ role: 'administrator' })
    const [message] = messageSchema.array().parse((await administrator.get('/api/mailbox')).body)
    expect(message).toMatchObject({ to: 'known@example.org', state: 'sent' })
    expect(message?.text).toContain('http://plans.example.org/password-resets/')
    expect(message?.sentAt).not.toBeNull()
  })
})

describe('a reset link', () => {
  test('sets the password once and ends every session', async () => {
    const client = await api.person({ email: 'lost@example.org' })
    const link = await linkFor('lost@example.org')
    expect((await visitor.put(link, { password: next })).status).toBe(204)
    expect((await client.get('/api/builds')).status).toBe(401)
    expect((await visitor.post('/api/session', { email: 'lost@example.org', password: testPassword })).status).toBe(401)
    const signedIn = await (await api.visitor()).post('/api/session', { email: 'lost@example.org', password: next })
    expect(signedIn.status).toBe(200)
    expect(code(await visitor.put(link, { password: next }))).toBe('link-expired')
  })

  test('used twice at the same moment works once', async () => {
    await api.person({ email: 'twice@example.org' })
    const link = await linkFor('twice@example.org')
    const answers = await Promise.all([visitor.put(link, { password: next }), visitor.put(link, { password: next })])
    expect(answers.map((answer) => answer.status).sort()).toEqual([204, 410])
  })

  test('voids the older ones, and so does a change of password', async () => {
    const client = await api.person({ email: 'many@example.org' })
    const [first, second] = [await linkFor('many@example.org'), await linkFor('many@example.org')]
    expect(first).not.toBe(second)
    await client.put('/api/account/password', { current: testPassword, next: 'another reel entirely' })
    expect(code(await visitor.put(first, { password: next }))).toBe('link-expired')
    expect(code(await visitor.put(second, { password: next }))).toBe('link-expired')
  })

  test('runs out', async () => {
    const { user } = await api.person({ email: 'old@example.org' })
    const link = await linkFor('old@example.org')
    await PasswordReset.update({ expiresAt: new Date(Date.now() - 1) }, { where: { userId: user?.id ?? '' } })
    expect(code(await visitor.put(link, { password: next }))).toBe('link-expired')
  })

  test('keeps working after a password that is refused', async () => {
    await api.person({ email: 'weak@example.org' })
    const link = await linkFor('weak@example.org')
    expect((await visitor.put(link, { password: 'password12345' })).status).toBe(400)
    expect((await visitor.put(link, { password: next })).status).toBe(204)
  })

  test('that was never given leads nowhere', async () => {
    expect(code(await visitor.put(`/api/password-resets/${'a'.repeat(43)}`, { password: next }))).toBe('link-expired')
    expect((await visitor.put('/api/password-resets/short', { password: next })).status).toBe(404)
  })

  test('is kept as a hash', async () => {
    await api.person({ email: 'kept@example.org' })
    const token = (await linkFor('kept@example.org')).split('/').at(-1) ?? ''
    expect(JSON.stringify(await PasswordReset.findAll())).not.toContain(token)
  })
})
