import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest'
import type { Activity } from '#shared/contract/activity.ts'
import { openBuildSchema } from '#shared/contract/build.ts'
import { madeLinkSchema } from '#shared/contract/buildLinks.ts'
import { deletedCommentSchema, pinMarkSchema, threadListSchema, threadSchema } from '#shared/contract/comments.ts'
import { BuildMember } from '../../server/models/index.ts'
import { listActivity } from '../../server/services/activityService.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { addCable, cablesDocument, edit, save } from './support/documents.ts'

let api: Api
let owner: Client
let reviewer: Client
let reader: Client
let stranger: Client
let build: string
let buildId: string

beforeAll(async () => {
  api = await startApi({ settings: { RATE_LIMIT_FACTOR: '1000' } })
  owner = await api.person({ name: 'Owner' })
  reviewer = await api.person({ name: 'Reviewer' })
  reader = await api.person({ name: 'Reader' })
  stranger = await api.person({ name: 'Stranger' })
})
afterAll(() => api.close())
beforeEach(async () => {
  const made = await owner.post('/api/builds/import', { document: cablesDocument('North room', 3) })
  buildId = openBuildSchema.parse(made.body).id
  build = `/api/builds/${buildId}`
  await BuildMember.create({ buildId, userId: idOf(reviewer), role: 'reviewer' })
  await BuildMember.create({ buildId, userId: idOf(reader), role: 'reader' })
})

const idOf = (client: Client): string => client.user?.id ?? ''
const asked = (text: string, more: object = {}) => ({
  requestId: randomUUID(),
  pin: { kind: 'part', part: 'p1' },
  about: 'what the page calls it',
  text,
  ...more,
})
const start = async (by: Client, text = 'Is W1 thick enough?', more: object = {}) => {
  const response = await by.post(`${build}/threads`, asked(text, more))
  expect(response.status, response.text).toBe(201)
  return threadSchema.parse(response.body)
}
const answer = async (by: Client, threadId: string, text: string) => {
  const response = await by.post(`${build}/threads/${threadId}/comments`, { requestId: randomUUID(), text })
  expect(response.status, response.text).toBe(201)
  return threadSchema.parse(response.body)
}
const list = async (by: Client, query = '') => threadListSchema.parse((await by.get(`${build}/threads${query}`)).body)
const happened = async () => (await listActivity(api.context, buildId, undefined)).items.map(({ what }) => what)
const newest = async (): Promise<Activity['what'] | undefined> => (await happened())[0]
const guestOf = async (kind: 'read' | 'review', name = 'Jo') => {
  const made = madeLinkSchema.parse((await owner.post(`${build}/links`, { kind, label: kind, days: 1 })).body)
  const guest = await api.visitor()
  expect((await guest.post(`/api/links/${made.token}/guests`, { name })).status).toBe(201)
  return guest
}

describe('a thread', () => {
  test('is numbered, remembers its revision and what it is about in words of the document', async () => {
    const first = await start(reviewer)
    expect(first).toMatchObject({
      number: 1,
      pin: { kind: 'part', part: 'p1' },
      about: 'W1',
      revision: 1,
      goneIn: null,
      resolved: null,
      comments: [
        { text: 'Is W1 thick enough?', by: { kind: 'member', name: 'Reviewer' }, isMine: true, isDeleted: false },
      ],
    })
    expect((await start(owner, 'And here', { pin: { kind: 'spot', x: 10, y: -4 } })).number).toBe(2)
    expect(await newest()).toMatchObject({ kind: 'comment-added', about: 'what the page calls it' })
  })

  test('is refused at a part that is not there', async () => {
    const response = await owner.post(`${build}/threads`, asked('x', { pin: { kind: 'part', part: 'p9' } }))
    expect(response.status).toBe(400)
    expect(response.body).toMatchObject({ code: 'bad-input', errors: [{ path: 'pin' }] })
  })

  test('is made once, however often its request comes', async () => {
    const request = asked('once')
    const answers = await Promise.all([1, 2, 3].map(() => owner.post(`${build}/threads`, request)))
    expect(new Set(answers.map(({ body }) => threadSchema.parse(body).id)).size).toBe(1)
    expect(threadSchema.parse(answers[0]?.body).comments).toHaveLength(1)
    expect((await happened()).filter(({ kind }) => kind === 'comment-added')).toHaveLength(1)
  })

  test('says in which revision its part was removed, and takes it back when the part returns', async () => {
    const { id } = await start(owner)
    const remove = await owner.post(
      `${build}/revisions`,
      save(1, edit('Remove W1', { op: 'removePart', id: 'p1' }), edit('More', addCable(9))),
    )
    expect(remove.status, remove.text).toBe(201)
    expect((await list(owner)).items.find((thread) => thread.id === id)).toMatchObject({ goneIn: 2, about: 'W1' })
    expect((await owner.post(`${build}/revisions`, save(2, edit('Back', addCable(1))))).status).toBe(201)
    expect((await list(owner)).items.find((thread) => thread.id === id)?.goneIn).toBeNull()
  })
})

describe('the list', () => {
  test('is narrowed by state, by one’s own and by mentions', async () => {
    const mine = await start(reviewer, 'mine')
    const named = await start(owner, `look, @{${idOf(reviewer)}}`)
    const done = await start(owner, 'done')
    expect((await owner.put(`${build}/threads/${done.id}/state`, { resolved: true })).status).toBe(200)
    const ids = async (query: string) => (await list(reviewer, query)).items.map(({ id }) => id).sort()
    expect(await ids('')).toEqual([mine.id, named.id].sort())
    expect(await ids('?state=resolved')).toEqual([done.id])
    expect(await ids('?state=all')).toHaveLength(3)
    expect(await ids('?of=mine')).toEqual([mine.id])
    expect(await ids('?of=mentioning-me')).toEqual([named.id])
    expect((await list(reviewer)).open).toBe(2)
    const pins = pinMarkSchema.array().parse((await reader.get(`${build}/pins`)).body)
    expect(pins.map(({ threadId }) => threadId).sort()).toEqual([mine.id, named.id].sort())
  })

  test('has the youngest word first, thirty a page', async () => {
    for (let i = 0; i < 31; i++) await start(owner, `thread ${i}`)
    const [oldest] = (await list(owner, '?page=2')).items
    expect(oldest?.comments[0]?.text).toBe('thread 0')
    await answer(owner, oldest?.id ?? '', 'still there')
    const first = await list(owner)
    expect(first).toMatchObject({ total: 31, page: 1 })
    expect(first.items).toHaveLength(30)
    expect(first.items[0]?.id).toBe(oldest?.id)
  })

  test('gives one thread by its id, and none of another build', async () => {
    const { id } = await start(owner, 'alone')
    expect(threadSchema.parse((await reader.get(`${build}/threads/${id}`)).body).comments[0]?.text).toBe('alone')
    const other = await owner.post('/api/builds/import', { document: cablesDocument('Other', 1) })
    const elsewhere = openBuildSchema.parse(other.body).id
    expect((await owner.get(`/api/builds/${elsewhere}/threads/${id}`)).status).toBe(404)
  })
})

describe('answers', () => {
  test('tell those who wrote before and those who are mentioned, never the writer', async () => {
    const { id } = await start(reviewer, 'first')
    await answer(owner, id, `second, @{${idOf(reader)}} @{${idOf(owner)}} @{${idOf(stranger)}}`)
    expect(await newest()).toMatchObject({
      mentions: [idOf(reader)],
      repliesTo: [idOf(reviewer)],
      excerpt: 'second, @Reader @Owner @former member',
    })
  })

  test('are edited and deleted by whoever wrote them', async () => {
    const { id } = await start(reviewer, 'first')
    const { comments } = await answer(owner, id, 'second')
    const [first, second] = comments
    const at = (comment = first) => `${build}/comments/${comment?.id ?? ''}`
    expect((await owner.patch(at(first), { text: 'not mine' })).status).toBe(403)
    expect((await owner.delete(at(first))).status).toBe(403)
    const edited = threadSchema.parse((await reviewer.patch(at(first), { text: 'first, better' })).body)
    expect(edited.comments[0]).toMatchObject({ text: 'first, better' })
    expect(edited.comments[0]?.editedAt).not.toBeNull()
    const stub = deletedCommentSchema.parse((await reviewer.delete(at(first))).body).thread
    expect(stub?.comments).toMatchObject([{ isDeleted: true, text: '' }, { text: 'second' }])
    expect((await reviewer.patch(at(first), { text: 'again' })).status).toBe(404)
    expect(deletedCommentSchema.parse((await owner.delete(at(second))).body).thread).toBeNull()
    expect((await list(owner, '?state=all')).total).toBe(0)
  })

  test('are kept under nobody’s name when the account is gone', async () => {
    const gone = await api.person({ name: 'Gone' })
    await BuildMember.create({ buildId, userId: idOf(gone), role: 'reviewer' })
    await start(gone, 'I was here')
    await start(owner, `ask @{${idOf(gone)}}`)
    await api.context.database.query('DELETE FROM users WHERE id = $1', { bind: [idOf(gone)] })
    const { items } = await list(owner)
    expect(items.map(({ comments }) => comments[0])).toMatchObject([
      { mentions: [{ userId: idOf(gone), name: null }] },
      { by: { kind: 'former' }, text: 'I was here' },
    ])
  })
})

describe('resolving', () => {
  test('is said once, with who did it, and can be taken back', async () => {
    const { id } = await start(reviewer)
    const resolve = (resolved: boolean) => owner.put(`${build}/threads/${id}/state`, { resolved })
    expect(threadSchema.parse((await resolve(true)).body).resolved?.by).toMatchObject({ name: 'Owner' })
    await resolve(true)
    expect((await happened()).filter(({ kind }) => kind === 'thread-resolved')).toHaveLength(1)
    expect(threadSchema.parse((await resolve(false)).body).resolved).toBeNull()
    expect(await newest()).toMatchObject({ kind: 'thread-reopened', about: 'W1' })
  })
})

describe('who may', () => {
  test('readers read and write nothing', async () => {
    const { id } = await start(owner)
    expect((await list(reader)).items).toHaveLength(1)
    expect((await reader.post(`${build}/threads`, asked('x'))).status).toBe(403)
    expect((await reader.put(`${build}/threads/${id}/state`, { resolved: true })).status).toBe(403)
    expect((await stranger.get(`${build}/threads`)).status).toBe(404)
  })

  test('guests of a review link write under their name and change their own', async () => {
    const guest = await guestOf('review')
    const { comments, id } = await start(guest, 'seen from the phone')
    expect(comments[0]).toMatchObject({ by: { kind: 'guest', name: 'Jo' }, isMine: true })
    const other = await guestOf('review', 'Jo')
    expect((await list(other)).items[0]?.comments[0]?.isMine).toBe(false)
    expect((await other.patch(`${build}/comments/${comments[0]?.id ?? ''}`, { text: 'no' })).status).toBe(403)
    expect((await guest.patch(`${build}/comments/${comments[0]?.id ?? ''}`, { text: 'better' })).status).toBe(200)
    expect((await list(guest, '?of=mine')).items.map((thread) => thread.id)).toEqual([id])
    expect((await guest.get(`${build}/mentionable`)).text).not.toMatch(/@example/)
  })

  test('guests of a read link only read', async () => {
    await start(owner)
    const guest = await guestOf('read')
    expect((await list(guest)).items).toHaveLength(1)
    expect((await guest.post(`${build}/threads`, asked('x'))).status).toBe(403)
  })

  test.each([
    ['no text', { text: '  ' }, 'text'],
    ['too much text', { text: 'x'.repeat(8001) }, 'text'],
    ['an unknown pin', { pin: { kind: 'moon' } }, 'pin.kind'],
    ['a spot off every sheet', { pin: { kind: 'spot', x: 1e9, y: 0 } }, 'pin.x'],
  ])('%s is refused by its place', async (_what, more, path) => {
    const response = await owner.post(`${build}/threads`, asked('x', more))
    expect(response.status).toBe(400)
    expect(response.body).toMatchObject({ errors: [{ path }] })
  })
})
