import { randomUUID } from 'node:crypto'
import { QueryTypes } from 'sequelize'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test } from 'vitest'
import { openBuildSchema } from '#shared/contract/build.ts'
import type { Happening } from '#shared/contract/activity.ts'
import { publish } from '../../server/events/publish.ts'
import { streamLimits } from '../../server/events/live.ts'
import { BuildLink, BuildMember, Guest } from '../../server/models/index.ts'
import { hashToken, makeToken } from '../../server/services/tokens.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { cablesDocument } from './support/documents.ts'
import { openEvents, type EventReader } from './support/eventStream.ts'

let api: Api
let owner: Client
let editor: Client
let buildId: string
let open: EventReader[] = []

beforeAll(async () => {
  api = await startApi()
  owner = await api.person({ name: 'Olga Owner' })
  editor = await api.person({ name: 'Edwin Editor' })
})
afterAll(() => api.close())
beforeEach(async () => {
  const made = await owner.post('/api/builds/import', { document: cablesDocument('Live', 2) })
  buildId = openBuildSchema.parse(made.body).id
  await BuildMember.create({ buildId, userId: idOf(editor), role: 'editor' })
})
afterEach(() => {
  for (const reader of open) reader.close()
  open = []
})

const idOf = (client: Client) => client.user?.id ?? ''
const say = (what: Happening, by = owner) =>
  api.context.database.transaction((transaction) =>
    publish(api.context, buildId, { userId: idOf(by) }, what, transaction),
  )
const named = (revision: number): Happening => ({ kind: 'revision-named', revision, name: `Named ${revision}` })

async function listen(client: Client, query = '', headers = {}): Promise<EventReader> {
  const reader = await openEvents(api.url, client, `/api/builds/${buildId}/events${query}`, headers)
  open.push(reader)
  return reader
}

async function guestOfLink(): Promise<{ client: Client; link: BuildLink }> {
  const expiresAt = new Date(Date.now() + 3_600_000)
  const link = await BuildLink.create({
    id: randomUUID(),
    buildId,
    kind: 'read',
    label: 'L',
    tokenHash: hashToken(makeToken()),
    madeBy: idOf(owner),
    expiresAt,
  })
  const token = makeToken()
  await Guest.create({ id: randomUUID(), linkId: link.id, buildId, name: 'Gil Guest', tokenHash: hashToken(token) })
  const client = await api.visitor()
  client.cookies.set('bayloom-guest', token)
  return { client, link }
}

describe('what happens in a build', () => {
  test('reaches everybody who has it open, with who did it', async () => {
    const reader = await listen(editor)
    const { lastId, revision } = await reader.next('hello')
    expect(revision).toBe(1)
    const id = await say(named(1))
    const line = await reader.next('activity')
    expect(line).toMatchObject({ id, buildId, by: { kind: 'member', name: 'Olga Owner' }, what: named(1) })
    expect(line.eventId).toBe(String(id))
    expect(id).toBeGreaterThan(lastId)
  })

  test('is not told before it is committed, nor at all where it is undone', async () => {
    const reader = await listen(editor)
    await reader.next('hello')
    const undone = api.context.database.transaction(async (transaction) => {
      await publish(api.context, buildId, { userId: idOf(owner) }, named(1), transaction)
      throw new Error('undone')
    })
    await expect(undone).rejects.toThrow('undone')
    await say(named(2))
    expect((await reader.next('activity')).what).toEqual(named(2))
  })

  test('is sent after a break from the line on that was heard last, each once and in order', async () => {
    const first = await listen(editor)
    await first.next('hello')
    await say(named(1))
    const { eventId = '' } = await first.next('activity')
    first.close()
    const missed: number[] = []
    for (let i = 2; i < 252; i++) missed.push(await say(named(i)))
    const again = await listen(editor, '', { 'last-event-id': eventId })
    expect((await again.next('hello')).lastId).toBe(Number(eventId))
    const live = Promise.all([say(named(300)), say(named(301)), say(named(302))])
    const heard: number[] = []
    while (heard.length < missed.length + 3) heard.push((await again.next('activity')).id)
    expect(heard).toEqual([...missed, ...(await live).sort((a, b) => a - b)])
    expect(again.left().filter((name) => name === 'activity')).toEqual([])
  })

  test('is not missed where the database cuts the connection that hears of it', async () => {
    const reader = await listen(editor)
    await reader.next('hello')
    const cut = await api.context.database.query(
      `SELECT pg_terminate_backend(pid) FROM pg_stat_activity
       WHERE datname = current_database() AND application_name = 'bayloom events'`,
      { type: QueryTypes.SELECT },
    )
    expect(cut).toHaveLength(1)
    const ids = [await say(named(1)), await say(named(2))]
    expect([(await reader.next('activity')).id, (await reader.next('activity')).id]).toEqual(ids)
    await say(named(3))
    expect((await reader.next('activity')).what).toEqual(named(3))
  })

  test('is not replayed to whoever missed very much: they read everything anew', async () => {
    await api.context.database.query(
      `INSERT INTO activity (build_id, user_id, kind, details)
       SELECT $1, $2, 'build-restored', '{}' FROM generate_series(1, 1001)`,
      { bind: [buildId, idOf(owner)] },
    )
    const rows = await api.context.database.query<{ first: string; last: string }>(
      'SELECT min(id) AS first, max(id) AS last FROM activity WHERE build_id = $1',
      { bind: [buildId], type: QueryTypes.SELECT },
    )
    const reader = await listen(editor, `?after=${Number(rows[0]?.first) - 1}`)
    expect((await reader.next('hello')).lastId).toBe(Number(rows[0]?.last))
    expect(reader.left()).not.toContain('activity')
  })

  test('is neither compressed nor gathered on the way', async () => {
    const { headers, status } = await listen(editor)
    expect(status).toBe(200)
    expect(headers['content-type']).toBe('text/event-stream; charset=utf-8')
    expect(headers['content-encoding']).toBeUndefined()
    expect(headers['cache-control']).toContain('no-transform')
    expect(headers['x-accel-buffering']).toBe('no')
  })

  test('is not for those outside, nor for those who do not ask for a stream', async () => {
    const stranger = await api.person()
    expect((await listen(stranger)).status).toBe(404)
    expect((await listen(await api.visitor())).status).toBe(401)
    expect((await owner.get(`/api/builds/${buildId}/events`)).status).toBe(400)
  })
})

describe('a stream ends at once', () => {
  test('when the person is taken out of the build', async () => {
    const reader = await listen(editor)
    await reader.next('hello')
    expect((await owner.delete(`/api/builds/${buildId}/members/${idOf(editor)}`)).status).toBe(204)
    expect(await reader.next('end')).toMatchObject({ reason: 'access' })
    await reader.ended
  })

  test('when the session ends', async () => {
    const elsewhere = await api.browserOf(editor.user!)
    const reader = await listen(elsewhere)
    await reader.next('hello')
    await elsewhere.delete('/api/session')
    expect(await reader.next('end')).toMatchObject({ reason: 'session' })
    await reader.ended
  })

  test('when the link is revoked; until then a guest hears too', async () => {
    const { client, link } = await guestOfLink()
    const reader = await listen(client)
    await reader.next('hello')
    await say(named(1))
    await reader.next('activity')
    await link.update({ revokedAt: new Date() })
    expect(await reader.next('end')).toMatchObject({ reason: 'access' })
    await reader.ended
  })

  test('when the person opens more than their share: the oldest goes', async () => {
    const readers: EventReader[] = []
    for (let i = 0; i <= streamLimits.person; i++) {
      const reader = await listen(editor)
      await reader.next('hello')
      readers.push(reader)
    }
    expect(await readers[0]?.next('end')).toMatchObject({ reason: 'too-many' })
    await say(named(1))
    await readers.at(-1)?.next('activity')
  })
})

describe('presence', () => {
  test('shows who has the build open and what they have chosen, until they leave', async () => {
    const [tabA, tabB, tabG] = [randomUUID(), randomUUID(), randomUUID()]
    const reader = await listen(owner, `?tab=${tabA}`)
    await reader.next('presence', (present) => present.length === 1)
    const other = await listen(editor, `?tab=${tabB}`)
    const { client } = await guestOfLink()
    await listen(client, `?tab=${tabG}`)
    const three = await reader.next('presence', (present) => present.length === 3)
    expect(three.map(({ by }) => ('name' in by ? by.name : '')).sort()).toEqual([
      'Edwin Editor',
      'Gil Guest',
      'Olga Owner',
    ])
    expect((await editor.put(`/api/builds/${buildId}/presence`, { tab: tabB, chosen: ['p1'] })).status).toBe(204)
    await reader.next('presence', (present) => present.some(({ tab, chosen }) => tab === tabB && chosen[0] === 'p1'))
    other.close()
    await reader.next('presence', (present) => present.length === 2 && !present.some(({ tab }) => tab === tabB))
  })

  test('nobody chooses in another person’s tab', async () => {
    const tab = randomUUID()
    const reader = await listen(owner, `?tab=${tab}`)
    await reader.next('presence')
    await editor.put(`/api/builds/${buildId}/presence`, { tab, chosen: ['p2'] })
    await owner.put(`/api/builds/${buildId}/presence`, { tab, chosen: ['p1'] })
    const [present] = await reader.next('presence')
    expect(present?.chosen).toEqual(['p1'])
  })
})
