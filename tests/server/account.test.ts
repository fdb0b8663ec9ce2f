import { QueryTypes } from 'sequelize'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { leavingSchema, ownSessionSchema } from '#shared/contract/account.ts'
import { openBuildSchema } from '#shared/contract/build.ts'
import { problemSchema } from '#shared/contract/problems.ts'
import { revisionSchema } from '#shared/contract/revisions.ts'
import { Build, BuildMember, Message, User } from '../../server/models/index.ts'
import { browserWords } from '../../server/services/ownSessionService.ts'
import { startApi, testPassword, type Api, type Client } from './support/api.ts'
import { addCable, cablesDocument, edit, note, save, testCable } from './support/documents.ts'

let api: Api
beforeAll(async () => {
  api = await startApi()
  await api.person({ role: 'administrator' })
})
afterAll(() => api.close())

const code = (response: { body: unknown }) => problemSchema.parse(response.body).code
const idOf = (client: Client): string => client.user?.id ?? ''
const makeBuild = async (client: Client, name: string): Promise<string> =>
  openBuildSchema.parse((await client.post('/api/builds/import', { document: cablesDocument(name, 2) })).body).id
const join = (buildId: string, client: Client, role: 'owner' | 'editor' | 'reader') =>
  BuildMember.create({ buildId, userId: idOf(client), role })
const happenings = (buildId: string) =>
  api.context.database.query<{ kind: string; user_id: string | null; details: Record<string, unknown> }>(
    'SELECT kind, user_id, details FROM activity WHERE build_id = $1 ORDER BY id',
    { bind: [buildId], type: QueryTypes.SELECT },
  )
const kinds = async (buildId: string) => (await happenings(buildId)).map(({ kind }) => kind)
const remove = (client: Client, password = testPassword) => client.send('delete', '/api/account', { password })

describe('handing a build over', () => {
  const handOver = (client: Client, buildId: string, body: object) =>
    client.post(`/api/builds/${buildId}/ownership`, body)

  test.each([
    ['owner', 'owner'],
    ['editor', 'editor'],
    ['leave', undefined],
  ] as const)('and then: %s', async (then, role) => {
    const [owner, heir] = [await api.person({ name: 'Olga' }), await api.person({ name: 'Edda' })]
    const buildId = await makeBuild(owner, 'Handed over')
    await join(buildId, heir, 'reader')
    expect((await handOver(owner, buildId, { to: idOf(heir), then })).status).toBe(204)
    const roleOf = async (client: Client) =>
      (await BuildMember.findOne({ where: { buildId, userId: idOf(client) } }))?.role
    expect([await roleOf(heir), await roleOf(owner)]).toEqual(['owner', role])
    const told = await happenings(buildId)
    expect(told[0]).toMatchObject({
      kind: 'ownership-transferred',
      user_id: idOf(owner),
      details: { userId: idOf(heir), name: 'Edda' },
    })
    expect(told.slice(1).map(({ kind }) => kind)).toEqual(then === 'leave' ? ['member-left'] : [])
  })

  test('is for owners, to another member', async () => {
    const [owner, editor, stranger] = [await api.person(), await api.person(), await api.person()]
    const buildId = await makeBuild(owner, 'Kept')
    await join(buildId, editor, 'editor')
    expect(code(await handOver(editor, buildId, { to: idOf(editor), then: 'leave' }))).toBe('forbidden')
    expect(code(await handOver(owner, buildId, { to: idOf(owner), then: 'leave' }))).toBe('bad-input')
    expect(code(await handOver(owner, buildId, { to: idOf(stranger), then: 'leave' }))).toBe('not-found')
    await User.update({ disabledAt: new Date() }, { where: { id: idOf(editor) } })
    expect(code(await handOver(owner, buildId, { to: idOf(editor), then: 'leave' }))).toBe('bad-input')
    expect(await kinds(buildId)).toEqual([])
  })
})

test('roles, leaving and archiving are told in the activity, and only where something changes', async () => {
  const [owner, member] = [await api.person(), await api.person({ name: 'Mira' })]
  const buildId = await makeBuild(owner, 'Told')
  await join(buildId, member, 'reader')
  const path = `/api/builds/${buildId}`
  for (const role of ['editor', 'editor']) await owner.patch(`${path}/members/${idOf(member)}`, { role })
  for (const act of ['archive', 'archive', 'restore', 'restore']) await owner.post(`${path}/${act}`)
  await member.delete(`${path}/members/${idOf(member)}`)
  expect(await happenings(buildId)).toMatchObject([
    { kind: 'role-changed', user_id: idOf(owner), details: { name: 'Mira', role: 'editor' } },
    { kind: 'build-archived' },
    { kind: 'build-restored' },
    { kind: 'member-left', user_id: idOf(member), details: { userId: idOf(member), name: 'Mira' } },
  ])
})

describe('one’s own sessions', () => {
  const list = async (client: Client) => ownSessionSchema.array().parse((await client.get('/api/sessions')).body)

  test('are listed with the browser, and ended one by one', async () => {
    const here = await api.person()
    const user = await User.findByPk(idOf(here))
    const there = await api.browserOf(user!)
    const before = await list(here)
    expect(before.map(({ current }) => current).sort()).toEqual([false, true])
    const other = before.find(({ current }) => !current)
    expect((await here.delete(`/api/sessions/${other?.id}`)).status).toBe(204)
    expect((await there.get('/api/sessions')).status).toBe(401)
    expect((await list(here)).map(({ current }) => current)).toEqual([true])
    expect((await here.delete(`/api/sessions/${other?.id}`)).status).toBe(404)
  })

  test('are ended all but the one that asks', async () => {
    const here = await api.person()
    const user = await User.findByPk(idOf(here))
    const others = [await api.browserOf(user!), await api.browserOf(user!)]
    expect((await here.delete('/api/sessions')).status).toBe(204)
    expect(await Promise.all(others.map(async (one) => (await one.get('/api/sessions')).status))).toEqual([401, 401])
    expect(await list(here)).toHaveLength(1)
  })

  test('of others are not there', async () => {
    const [one, other] = [await api.person(), await api.person()]
    const [theirs] = await list(other)
    expect((await one.delete(`/api/sessions/${theirs?.id}`)).status).toBe(404)
    expect(await list(other)).toHaveLength(1)
  })

  test('say in which browser they were opened', async () => {
    const email = 'agent@example.org'
    await api.person({ email })
    const visitor = await api.visitor()
    const agent = 'Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0'
    await visitor.send('post', '/api/session', { email, password: testPassword }, { 'user-agent': agent })
    expect((await list(visitor)).find(({ current }) => current)?.browser).toBe('Firefox on Linux')
    expect(browserWords('Mozilla/5.0 (iPhone; CPU iPhone OS 18_0) AppleWebKit/605 Version/18 Safari/604')).toBe(
      'Safari on iPhone or iPad',
    )
    expect(browserWords('curl/8')).toBe('Another program')
    expect(browserWords(undefined)).toBeNull()
  })
})

describe('deleting one’s account', () => {
  test('says what it does, and asks for the password again', async () => {
    const [person, other] = [await api.person(), await api.person()]
    const alone = await makeBuild(person, 'Alone')
    const held = await makeBuild(person, 'Held')
    await join(held, other, 'reader')
    const theirs = await makeBuild(other, 'Theirs')
    await join(theirs, person, 'editor')
    expect(leavingSchema.parse((await person.get('/api/account/leaving')).body)).toEqual({
      toHandOver: [{ id: held, name: 'Held', others: 1 }],
      toDelete: [{ id: alone, name: 'Alone', others: 0 }],
      toLeave: 1,
    })
    expect(code(await remove(person, 'not my password'))).toBe('bad-input')
    const refused = await remove(person)
    expect(code(refused)).toBe('last-owner')
    expect(refused.body).toMatchObject({ builds: [{ id: held }] })
    expect(await User.findByPk(idOf(person))).not.toBeNull()
  })

  test('keeps the history of builds that stay, under former member, and nothing else of the person', async () => {
    const [person, other] = [await api.person({ name: 'Gone Away', email: 'gone@example.org' }), await api.person()]
    const alone = await makeBuild(person, 'Alone')
    const shared = await makeBuild(other, 'Shared')
    await join(shared, person, 'reader')
    await other.patch(`/api/builds/${shared}/members/${idOf(person)}`, { role: 'editor' })
    await person.post(`/api/builds/${shared}/revisions`, save(1, edit('Theirs', note('p1', 'stays'))))
    await person.put(`/api/own-models/${testCable.id}`, { model: testCable })
    await Message.create({ id: alone, recipient: 'gone@example.org', subject: 's', textBody: 't', htmlBody: 'h' })
    const userId = idOf(person)

    expect((await remove(person)).status).toBe(204)
    expect((await person.get('/api/account/leaving')).status).toBe(401)
    expect(await User.findByPk(userId)).toBeNull()
    expect(await Build.findByPk(alone)).toBeNull()
    const history = revisionSchema.array().parse((await other.get(`/api/builds/${shared}/revisions`)).body)
    expect(history.map(({ label, savedBy }) => [label, savedBy])).toEqual([
      ['Theirs', null],
      ['Import', 'Ada Quill'],
    ])
    const told = await happenings(shared)
    expect(told.map(({ kind, user_id }) => [kind, user_id])).toEqual([
      ['role-changed', idOf(other)],
      ['revision-saved', null],
      ['member-left', null],
    ])
    expect(JSON.stringify(told)).not.toContain('Gone Away')
    expect(await Message.count({ where: { recipient: 'gone@example.org' } })).toBe(0)
    const document = openBuildSchema.parse((await other.get(`/api/builds/${shared}`)).body).document
    expect(document).toMatchObject({ parts: [{ note: 'stays' }, {}] })
  })

  test('works once the builds are handed over', async () => {
    const [person, other] = [await api.person(), await api.person()]
    const buildId = await makeBuild(person, 'Held')
    await join(buildId, other, 'reader')
    expect(code(await remove(person))).toBe('last-owner')
    await person.post(`/api/builds/${buildId}/ownership`, { to: idOf(other), then: 'editor' })
    expect((await remove(person)).status).toBe(204)
    expect((await other.get(`/api/builds/${buildId}`)).status).toBe(200)
  })

  test('is not for the last administrator', async () => {
    const administrators = await User.findAll({ where: { role: 'administrator' } })
    expect(administrators).toHaveLength(1)
    const last = await api.browserOf(administrators[0]!)
    expect(code(await remove(last))).toBe('last-administrator')
  })
})

describe('everything of one’s own', () => {
  test('comes as one file: account, builds with their revisions, own models, and what names the person elsewhere', async () => {
    const [person, other] = [await api.person({ name: 'Ilse', email: 'ilse@example.org' }), await api.person()]
    const own = await makeBuild(person, 'Own build')
    await person.post(`/api/builds/${own}/revisions`, save(1, edit('Add', addCable(7))))
    await person.post(`/api/builds/${own}/revisions`, save(2, edit('Note', note('p1', 'x'))))
    const theirs = await makeBuild(other, 'Their build')
    await other.post(`/api/builds/${theirs}/revisions`, save(1, edit('Secret past', note('p1', 'x'))))
    await join(theirs, person, 'reader')
    await person.put(`/api/own-models/${testCable.id}`, { model: testCable })

    const response = await person.get('/api/account/export')
    expect(response.headers['content-disposition']).toContain('Bayloom account of Ilse.json')
    const exported = response.body as {
      account: Record<string, unknown>
      builds: { name: string; role: string; revisions: { label: string; document: unknown; edits: unknown[] }[] }[]
      records: Record<string, Record<string, unknown>[]>
    }
    expect(exported.account).toMatchObject({ name: 'Ilse', email: 'ilse@example.org' })
    expect(
      exported.builds.map(({ name, role, revisions }) => [name, role, revisions.map(({ label }) => label)]),
    ).toEqual([
      ['Own build', 'owner', ['Import', 'Add', 'Note']],
      ['Their build', 'reader', ['Secret past']],
    ])
    const [first, second, third] = exported.builds[0]?.revisions ?? []
    expect([first?.document, second?.document, third?.document].map(Boolean)).toEqual([true, false, true])
    expect(second?.edits).toHaveLength(1)
    expect(exported.records['own_models by user_id']).toMatchObject([{ model_id: testCable.id }])
    expect(exported.records['sessions by user_id']).toHaveLength(1)
    expect(response.text).not.toMatch(/\$argon2|password_hash|token_hash/)
  })
})
