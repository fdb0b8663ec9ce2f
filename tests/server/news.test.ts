import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest'
import type { Happening } from '#shared/contract/activity.ts'
import { openBuildSchema } from '#shared/contract/build.ts'
import { noticePageSchema } from '#shared/contract/notifications.ts'
import { publish, type Cause } from '../../server/events/publish.ts'
import { BuildMember, Message } from '../../server/models/index.ts'
import { nextDigest } from '../../server/services/digestTimes.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { cablesDocument } from './support/documents.ts'

let api: Api
let owner: Client
let editor: Client
let reviewer: Client
let buildId: string
const links: (string | null)[] = []

beforeAll(async () => {
  api = await startApi({
    settings: { PUBLIC_URL: 'http://plans.example.org' },
    transport: (_message, unsubscribe) => Promise.resolve(void links.push(unsubscribe)),
  })
  owner = await api.person({ name: 'Olga Owner', email: 'olga@example.org' })
  editor = await api.person({ name: 'Edwin Editor', email: 'edwin@example.org' })
  reviewer = await api.person({ name: 'Rita Reviewer', email: 'rita@example.org' })
})
afterAll(() => api.close())
beforeEach(async () => {
  await api.context.jobs.drain()
  await Message.destroy({ where: {} })
  await api.context.database.query('DELETE FROM mail_choices')
  await api.context.database.query('DELETE FROM notifications')
  const made = await owner.post('/api/builds/import', { document: cablesDocument('Told', 1) })
  buildId = openBuildSchema.parse(made.body).id
  await BuildMember.create({ buildId, userId: idOf(editor), role: 'editor' })
  await BuildMember.create({ buildId, userId: idOf(reviewer), role: 'reviewer' })
})

const idOf = (client: Client) => client.user?.id ?? ''
const by = (client: Client): Cause => ({ userId: idOf(client) })
const say = (what: Happening, cause: Cause) =>
  api.context.database.transaction((transaction) => publish(api.context, buildId, cause, what, transaction))
const comment = (more: Partial<Extract<Happening, { kind: 'comment-added' }>> = {}): Happening => ({
  kind: 'comment-added',
  threadId: 't1',
  commentId: 'c1',
  about: 'W1',
  excerpt: 'Is <this> lead long enough?',
  mentions: [],
  repliesTo: [],
  ...more,
})
const asked = (...people: Client[]): Happening => ({
  kind: 'round-asked',
  roundId: 'r1',
  round: 1,
  revision: 1,
  asked: people.map(idOf),
  question: 'Is the second lead fine?',
})
const verdict: Happening = {
  kind: 'verdict-given',
  roundId: 'r1',
  round: 1,
  revision: 1,
  verdict: 'approve',
  summary: 'Good',
}
const noticesOf = async (client: Client) => noticePageSchema.parse((await client.get('/api/notifications')).body)
const reasonsOf = async (client: Client) => (await noticesOf(client)).items.map((item) => item.reason)
const mailed = async () =>
  (await Message.findAll({ order: ['recipient'] })).map((one) => `${one.recipient} ${one.kind} ${one.state}`)

describe('who is told', () => {
  test('the mentioned, those who wrote there before, and the owners; nobody twice, nobody of their own act', async () => {
    await say(
      comment({ mentions: [idOf(reviewer), idOf(editor)], repliesTo: [idOf(reviewer), idOf(editor)] }),
      by(editor),
    )
    await api.context.jobs.drain()
    expect([await reasonsOf(owner), await reasonsOf(editor), await reasonsOf(reviewer)]).toEqual([
      ['comment'],
      [],
      ['mention'],
    ])
    // Comments on one's own builds come in the digest unless chosen otherwise.
    expect(await mailed()).toEqual(['rita@example.org mention sent'])
  })

  test('who was asked for a review by name, and of the verdict whoever asked and the owners', async () => {
    await say(asked(reviewer), by(editor))
    await say(verdict, by(reviewer))
    await api.context.jobs.drain()
    expect([await reasonsOf(owner), await reasonsOf(editor), await reasonsOf(reviewer)]).toEqual([
      ['verdict'],
      ['verdict'],
      ['review-asked'],
    ])
    expect(await mailed()).toEqual([
      'edwin@example.org verdict sent',
      'olga@example.org verdict sent',
      'rita@example.org review-asked sent',
    ])
  })

  test('nobody who has left by then: neither before the news are told nor before the mail is sent', async () => {
    await say(asked(reviewer, editor), by(owner))
    await BuildMember.destroy({ where: { buildId, userId: idOf(editor) } })
    await api.context.jobs.drain()
    expect(await mailed()).toEqual(['rita@example.org review-asked sent'])

    await Message.update({ state: 'queued' }, { where: {} })
    const [message] = await Message.findAll()
    await BuildMember.destroy({ where: { buildId, userId: idOf(reviewer) } })
    const administrator = await api.person({ role: 'administrator' })
    await administrator.post(`/api/mailbox/${message?.id}/again`)
    await api.context.jobs.drain()
    expect(await mailed()).toEqual(['rita@example.org review-asked dropped'])
    expect(await reasonsOf(reviewer)).toEqual([])
  })

  test('once, however often a job is done', async () => {
    const id = await say(asked(reviewer), by(owner))
    await api.context.jobs.drain()
    const boss = `INSERT INTO pgboss.job (name, data) VALUES ('news', '{"activityId": ${id}}')`
    await api.context.database.query(boss)
    await api.context.jobs.drain()
    expect(await mailed()).toEqual(['rita@example.org review-asked sent'])
  })

  test('notifications are marked as read one by one or all up to one', async () => {
    const first = await say(asked(reviewer), by(owner))
    const second = await say(comment({ mentions: [idOf(reviewer)] }), by(owner))
    await say(comment({ mentions: [idOf(reviewer)], commentId: 'c2' }), by(owner))
    await api.context.jobs.drain()
    expect(await noticesOf(reviewer)).toMatchObject({ unread: 3, items: [{ buildName: 'Told', read: false }, {}, {}] })
    expect((await reviewer.post('/api/notifications/read', { id: second })).body).toEqual({ unread: 2 })
    expect((await reviewer.post('/api/notifications/read', { upTo: second })).body).toEqual({ unread: 1 })
    expect((await noticesOf(reviewer)).items.map((item) => item.read)).toEqual([false, true, true])
    expect((await owner.post('/api/notifications/read', { id: first })).body).toEqual({ unread: 0 })
  })
})

describe('what is mailed', () => {
  test('says who, what and where in plain words and in HTML, leads to the very thing, and holds nothing as markup', async () => {
    await say(comment({ mentions: [idOf(reviewer)] }), by(editor))
    await api.context.jobs.drain()
    const mail = await Message.findOne()
    expect(mail?.subject).toBe('Edwin Editor mentions you in "Told", on W1')
    expect(mail?.textBody).toContain('> Is <this> lead long enough?')
    expect(mail?.htmlBody).toContain('Is &lt;this&gt; lead long enough?')
    const place = `http://plans.example.org/builds/${buildId}?thread=t1&comment=c1`
    expect(mail?.textBody).toContain(place)
    expect(mail?.htmlBody).toContain(place.replace('&', '&amp;'))
    expect(mail?.htmlBody).toContain('max-width:600px')
    expect(mail?.htmlBody).not.toContain('<table')
  })

  test('follows each person’s choice', async () => {
    expect((await reviewer.get('/api/account/mail-choices')).body).toMatchObject({
      mention: 'at-once',
      digest: 'weekly',
    })
    expect((await reviewer.put('/api/account/mail-choices', { kind: 'mention', timing: 'never' })).body).toMatchObject({
      mention: 'never',
    })
    expect((await reviewer.put('/api/account/mail-choices', { kind: 'mention', timing: 'weekly' })).status).toBe(400)
    await owner.put('/api/account/mail-choices', { kind: 'comment', timing: 'at-once' })
    await say(comment({ mentions: [idOf(reviewer)] }), by(editor))
    await api.context.jobs.drain()
    expect(await mailed()).toEqual(['olga@example.org comment sent'])
    expect(await reasonsOf(reviewer)).toEqual(['mention'])
  })
})

describe('an unsubscribe link', () => {
  const tokenIn = (text: string | undefined) => /\/unsubscribe\/(\S+)/.exec(text ?? '')?.[1] ?? ''

  test('works at once from a mail program, says what it switched off, and can be undone', async () => {
    links.length = 0
    await say(asked(reviewer), by(owner))
    await api.context.jobs.drain()
    const mail = await Message.findOne()
    const token = tokenIn(mail?.textBody)
    expect(links).toEqual([`http://plans.example.org/api/unsubscribe/${token}`])

    // RFC 8058, section 3.2: a POST from anywhere, without cookies, with this very body.
    const answer = await fetch(`${api.url}/api/unsubscribe/${token}`, {
      method: 'POST',
      headers: { 'content-type': 'application/x-www-form-urlencoded', origin: 'https://mail.example.net' },
      body: 'List-Unsubscribe=One-Click',
    })
    expect([answer.status, await answer.json()]).toEqual([200, { kind: 'review-asked', timing: 'never' }])
    await say(asked(reviewer), by(owner))
    await api.context.jobs.drain()
    expect(await Message.count()).toBe(1)

    const visitor = await api.visitor()
    await visitor.post(`/api/unsubscribe/${token}`)
    expect((await visitor.post(`/api/unsubscribe/${token}/undo`)).body).toEqual({
      kind: 'review-asked',
      timing: 'at-once',
    })
    await say(asked(reviewer), by(owner))
    await api.context.jobs.drain()
    expect(await Message.count()).toBe(2)
  })

  test('is sealed: another kind or address in it leads nowhere', async () => {
    await say(asked(reviewer), by(owner))
    await api.context.jobs.drain()
    const [, address, seal] = tokenIn((await Message.findOne())?.textBody).split('.')
    const visitor = await api.visitor()
    const other = Buffer.from('olga@example.org').toString('base64url')
    for (const forged of [
      `mention.${address}.${seal}`,
      `review-asked.${other}.${seal}`,
      `review-asked.${address}.${'a'.repeat(43)}`,
    ])
      expect((await visitor.post(`/api/unsubscribe/${forged}`)).status).toBe(404)
  })

  test('of an invitation keeps further ones away, and tells whoever invites', async () => {
    const invite = () => owner.post(`/api/builds/${buildId}/invitations`, { email: 'new@example.org', role: 'reader' })
    expect((await invite()).status).toBe(201)
    await (await api.visitor()).post(`/api/unsubscribe/${tokenIn((await Message.findOne())?.textBody)}`)
    const again = await invite()
    expect([again.status, (again.body as { detail: string }).detail]).toEqual([
      403,
      'new@example.org has asked not to be invited by mail. Send a link yourself.',
    ])
  })
})

describe('the digest', () => {
  const due = () => api.context.database.query("UPDATE digests SET next_at = now() - interval '1 second'")
  const settle = () => api.context.database.query("UPDATE activity SET at = at - interval '2 minutes'")

  test('sums up what others did and what waits for the person, once', async () => {
    await settle()
    await due()
    await api.context.jobs.drain()
    await Message.destroy({ where: {} })
    for (let revision = 2; revision < 30; revision++)
      await say({ kind: 'revision-saved', revision, label: `Move C${revision}` }, by(editor))
    await say(comment(), by(editor))
    await api.context.jobs.drain()
    await settle()
    await due()
    await api.context.jobs.drain()
    const [mail, ...others] = await Message.findAll({ where: { recipient: 'olga@example.org' } })
    expect(others).toEqual([])
    expect(mail).toMatchObject({ kind: 'digest', state: 'sent', subject: '"Told" this week' })
    expect(mail?.textBody).toContain('For you\n- Told: Edwin Editor commented on W1')
    expect(mail?.textBody).toContain('- Edwin Editor saved revisions 2 to 29, last: Move C29')
    // Who did it all gets none of it.
    expect(await Message.count({ where: { recipient: 'edwin@example.org' } })).toBe(0)

    await due()
    await api.context.jobs.drain()
    expect(await Message.count({ where: { recipient: 'olga@example.org' } })).toBe(1)
  })

  test('is not sent to who wants none, and does not pile up for them', async () => {
    await settle()
    await due()
    await api.context.jobs.drain()
    await owner.put('/api/account/mail-choices', { kind: 'digest', timing: 'never' })
    await say({ kind: 'revision-saved', revision: 2, label: 'Then' }, by(editor))
    await settle()
    await due()
    await api.context.jobs.drain()
    await owner.put('/api/account/mail-choices', { kind: 'digest', timing: 'daily' })
    await due()
    await api.context.jobs.drain()
    expect(await Message.count({ where: { recipient: 'olga@example.org' } })).toBe(0)
  })

  test('is due at six in the morning (UTC), each day or each Monday', () => {
    const tuesday = new Date('2026-12-01T07:00:00Z')
    expect(nextDigest('daily', tuesday).toISOString()).toBe('2026-12-02T06:00:00.000Z')
    expect(nextDigest('daily', new Date('2026-12-01T05:59:59Z')).toISOString()).toBe('2026-12-01T06:00:00.000Z')
    expect(nextDigest('weekly', tuesday).toISOString()).toBe('2026-12-07T06:00:00.000Z')
    expect(nextDigest('weekly', new Date('2026-12-07T06:00:00Z')).toISOString()).toBe('2026-12-14T06:00:00.000Z')
  })
})
