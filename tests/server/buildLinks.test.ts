import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest'
import { openBuildSchema } from '#shared/contract/build.ts'
import { buildLinkSchema, linkViewSchema, longestLink_days, madeLinkSchema } from '#shared/contract/buildLinks.ts'
import { sessionSchema } from '#shared/contract/session.ts'
import { BuildLink, BuildMember, Guest } from '../../server/models/index.ts'
import { rateLimits } from '../../server/middleware/rateLimit.ts'
import { hashToken } from '../../server/services/tokens.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { cablesDocument } from './support/documents.ts'

let api: Api
let owner: Client
let buildId: string
let links: string

beforeAll(async () => {
  api = await startApi({ settings: { TRUST_PROXY: '1' } })
  owner = await api.person({ name: 'Owner', email: 'owner@example.org' })
})
afterAll(() => api.close())
beforeEach(async () => {
  const made = await owner.post('/api/builds/import', { document: cablesDocument('North room', 2) })
  buildId = openBuildSchema.parse(made.body).id
  links = `/api/builds/${buildId}/links`
})

const make = async (more: object = {}) => {
  const response = await owner.post(links, { kind: 'review', label: 'For Jo', days: 14, ...more })
  expect(response.status, response.text).toBe(201)
  return madeLinkSchema.parse(response.body)
}
const list = async () => buildLinkSchema.array().parse((await owner.get(links)).body)
const comeIn = async (token: string, body: object = { name: 'Jo' }) => {
  const guest = await api.visitor()
  return { guest, response: await guest.post(`/api/links/${token}/guests`, body) }
}
const seen = async (client: Client) => (await client.get(`/api/builds/${buildId}`)).status

describe('a link', () => {
  test('is told once and kept as a hash', async () => {
    const { link, token } = await make()
    expect(token).toMatch(/^[\w-]{43}$/)
    const row = await BuildLink.findByPk(link.id)
    expect(row?.tokenHash).toBe(hashToken(token))
    const told = await owner.get(links)
    expect(told.text).not.toContain(token)
    expect(told.text).not.toContain(hashToken(token))
    const lifetime_days = (Date.parse(link.expiresAt) - Date.now()) / 86_400_000
    expect(lifetime_days).toBeGreaterThan(13.9)
    expect(lifetime_days).toBeLessThanOrEqual(14)
  })

  test('lives a year at most, and a day at least', async () => {
    const asked = async (days: number) => (await owner.post(links, { kind: 'read', label: 'x', days })).status
    expect(await Promise.all([0, 1, longestLink_days, longestLink_days + 1].map(asked))).toEqual([400, 201, 201, 400])
  })

  test('says what it leads to, and behind a pass phrase only that there is one', async () => {
    const open = await make()
    const shut = await make({ passPhrase: 'eight or more' })
    const visitor = await api.visitor()
    expect(linkViewSchema.parse((await visitor.get(`/api/links/${open.token}`)).body)).toMatchObject({
      kind: 'review',
      needsPassPhrase: false,
      buildName: 'North room',
      madeBy: 'Owner',
      inside: null,
    })
    const told = await visitor.get(`/api/links/${shut.token}`)
    expect(linkViewSchema.parse(told.body)).toMatchObject({ needsPassPhrase: true, buildName: null, madeBy: null })
    expect(told.text).not.toContain('North room')
    expect(told.text).not.toContain(buildId)
  })

  test('keeps its pass phrase with Argon2id and lets nobody in without it', async () => {
    const { link, token } = await make({ passPhrase: 'four feet of leader' })
    expect((await BuildLink.findByPk(link.id))?.passPhraseHash).toMatch(/^\$argon2id\$/)
    expect(link.hasPassPhrase).toBe(true)
    expect((await comeIn(token)).response.body).toMatchObject({ code: 'wrong-credentials' })
    const wrong = await comeIn(token, { name: 'Jo', passPhrase: 'five feet of leader' })
    expect(wrong.response.status).toBe(401)
    expect(await seen(wrong.guest)).toBe(401)
    const right = await comeIn(token, { name: 'Jo', passPhrase: 'four feet of leader' })
    expect(right.response.status).toBe(201)
    expect(await seen(right.guest)).toBe(200)
  })

  test('that nobody made, that is over, or that was revoked, opens nothing and tells nothing', async () => {
    const [over, revoked] = [await make(), await make()]
    await BuildLink.update({ expiresAt: new Date(Date.now() - 1000) }, { where: { id: over.link.id } })
    expect((await owner.delete(`${links}/${revoked.link.id}`)).status).toBe(204)
    const visitor = await api.visitor()
    for (const token of ['a'.repeat(43), over.token, revoked.token]) {
      for (const response of [
        await visitor.get(`/api/links/${token}`),
        await visitor.post(`/api/links/${token}/guests`, { name: 'Jo' }),
      ]) {
        expect(response.status).toBe(410)
        expect(response.body).toMatchObject({ code: 'link-expired' })
        expect(response.text).not.toContain('North room')
      }
    }
    expect((await list()).map(({ state }) => state).sort()).toEqual(['expired', 'revoked'])
  })
})

describe('a guest', () => {
  test('comes in under a name, sees the build without a role, and no address of anybody', async () => {
    const { token } = await make({ kind: 'read' })
    const { guest } = await comeIn(token)
    const response = await guest.get(`/api/builds/${buildId}`)
    const opened = openBuildSchema.parse(response.body)
    expect(opened).toMatchObject({ role: null, guest: { name: 'Jo', right: 'read' }, name: 'North room' })
    expect(opened.people).toEqual([{ name: 'Owner', role: 'owner' }])
    expect(response.text).not.toContain('@')
    const session = sessionSchema.parse((await guest.get('/api/session')).body)
    expect(session).toMatchObject({ user: null, guest: { name: 'Jo', buildId, buildName: 'North room' } })
  })

  test('is known by a cookie that scripts cannot read, and by nothing that the database holds', async () => {
    const { token } = await make()
    const guest = await api.visitor()
    const response = await guest.post(`/api/links/${token}/guests`, { name: 'Jo' })
    const cookie = String((response.headers as Record<string, unknown>)['set-cookie'])
    expect(cookie).toMatch(/^bayloom-guest=[\w-]{43};/)
    expect(cookie).toContain('HttpOnly')
    expect(cookie).toContain('SameSite=Strict')
    const value = guest.cookies.get('bayloom-guest') ?? ''
    expect(await Guest.count({ where: { tokenHash: hashToken(value) } })).toBe(1)
    expect(await Guest.count({ where: { tokenHash: value } })).toBe(0)
  })

  test('cannot come in, leave or judge with a forged request', async () => {
    const { token } = await make()
    const guest = await api.visitor()
    guest.csrfToken = 'another'
    expect((await guest.post(`/api/links/${token}/guests`, { name: 'Jo' })).body).toMatchObject({
      code: 'forged-request',
    })
    expect((await guest.delete('/api/guest')).status).toBe(403)
  })

  test('is out at once when an owner closes them out, and the others stay', async () => {
    const { token } = await make()
    const [jo, kim] = [await comeIn(token), await comeIn(token, { name: 'Kim' })]
    const [link] = await list()
    expect(link?.guests.map(({ name, state }) => [name, state])).toEqual([
      ['Kim', 'here'],
      ['Jo', 'here'],
    ])
    const joId = link?.guests[1]?.id ?? ''
    expect((await owner.delete(`/api/builds/${buildId}/guests/${joId}`)).status).toBe(204)
    expect(await seen(jo.guest)).toBe(401)
    expect(await seen(kim.guest)).toBe(200)
    expect((await list())[0]?.guests[1]?.state).toBe('closed out')
  })

  test('is out at once when the link is revoked', async () => {
    const { link, token } = await make()
    const { guest } = await comeIn(token)
    expect(await seen(guest)).toBe(200)
    await owner.delete(`${links}/${link.id}`)
    expect(await seen(guest)).toBe(401)
    const over = { guest: null, visitEnded: true }
    expect(sessionSchema.parse((await guest.get('/api/session')).body)).toMatchObject(over)
    expect(guest.cookies.has('bayloom-guest')).toBe(false)
    expect(sessionSchema.parse((await guest.get('/api/session')).body).visitEnded).toBe(false)
  })

  test('leaves, and the cookie then opens nothing, wherever it was copied to', async () => {
    const { token } = await make()
    const { guest } = await comeIn(token)
    const copied = guest.cookies.get('bayloom-guest') ?? ''
    expect((await guest.delete('/api/guest')).status).toBe(204)
    expect(guest.cookies.has('bayloom-guest')).toBe(false)
    guest.cookies.set('bayloom-guest', copied)
    expect(await seen(guest)).toBe(401)
    expect((await list())[0]?.guests[0]?.state).toBe('left')
  })

  test('who signs in with a role uses the role; without one they stay the guest', async () => {
    const { token } = await make({ kind: 'read' })
    const member = await api.person({ name: 'Editor' })
    expect((await member.post(`/api/links/${token}/guests`, { name: 'Ed' })).status).toBe(201)
    expect(openBuildSchema.parse((await member.get(`/api/builds/${buildId}`)).body).guest?.name).toBe('Ed')
    await BuildMember.create({ buildId, userId: member.user?.id ?? '', role: 'editor' })
    expect(openBuildSchema.parse((await member.get(`/api/builds/${buildId}`)).body)).toMatchObject({
      role: 'editor',
      guest: null,
    })
    const view = linkViewSchema.parse((await member.get(`/api/links/${token}`)).body)
    expect(view.inside).toEqual({ buildId, as: 'member', name: 'Editor' })
  })

  test('and their comings are in the build’s activity', async () => {
    const { token, link } = await make()
    await comeIn(token)
    await owner.delete(`${links}/${link.id}`)
    const rows = await api.context.database.query(
      'SELECT kind, guest_id IS NOT NULL AS guest FROM activity WHERE build_id = $1 ORDER BY id',
      { bind: [buildId] },
    )
    expect(rows[0]).toEqual([
      { kind: 'link-made', guest: false },
      { kind: 'guest-joined', guest: true },
      { kind: 'link-revoked', guest: false },
    ])
  })
})

describe('tries', () => {
  const tryFrom = (client: Client, token: string, address: string) =>
    client.send(
      'post',
      `/api/links/${token}/guests`,
      { name: 'Jo', passPhrase: 'guess' },
      { 'x-forwarded-for': address },
    )
  const most = (per: string) => rateLimits['join-link'].find((limit) => limit.per === per)?.most ?? NaN

  test('are counted by address, whatever the link', async () => {
    const visitor = await api.visitor()
    for (let i = 0; i < most('address'); i++)
      expect((await tryFrom(visitor, `${'b'.repeat(40)}${100 + i}`, '198.51.100.7')).status).toBe(410)
    expect((await tryFrom(visitor, 'c'.repeat(43), '198.51.100.7')).status).toBe(429)
    expect((await tryFrom(visitor, 'c'.repeat(43), '198.51.100.8')).status).toBe(410)
  })

  test('are counted by link, from wherever they come', async () => {
    const visitor = await api.visitor()
    const token = 'd'.repeat(43)
    for (let i = 0; i < most('link'); i++) expect((await tryFrom(visitor, token, `203.0.113.${i}`)).status).toBe(410)
    expect((await tryFrom(visitor, token, '203.0.113.200')).status).toBe(429)
  })
})
