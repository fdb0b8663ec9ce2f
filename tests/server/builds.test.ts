import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { QueryTypes } from 'sequelize'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { buildDocumentSchema } from '#shared/build/document.ts'
import { buildListSchema, buildSummarySchema, openBuildSchema } from '#shared/contract/build.ts'
import { exampleSchema } from '#shared/contract/catalog.ts'
import { checkResultSchema } from '#shared/check/result.ts'
import { problemSchema } from '#shared/contract/problems.ts'
import { Build } from '../../server/models/index.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { cablesDocument } from './support/documents.ts'

let api: Api
let owner: Client
const examples = mkdtempSync(join(tmpdir(), 'bayloom-examples-'))

beforeAll(async () => {
  mkdirSync(join(examples, 'two-cables'))
  writeFileSync(join(examples, 'two-cables', 'build.json'), JSON.stringify(cablesDocument('Two cables', 2)))
  writeFileSync(join(examples, 'two-cables', 'README.md'), '\n# Nothing but two cables\n\nMore words.\n')
  mkdirSync(join(examples, 'broken'))
  writeFileSync(join(examples, 'broken', 'build.json'), '{"format": "bayloom-build"')
  api = await startApi({ settings: { EXAMPLES_DIR: examples } })
  owner = await api.person({ name: 'Owner' })
})
afterAll(async () => {
  await api.close()
  rmSync(examples, { recursive: true })
})

const importing = async (client: Client, document: unknown) => {
  const response = await client.post('/api/builds/import', { document })
  expect(response.status).toBe(201)
  return openBuildSchema.parse(response.body)
}
const list = async (client: Client, query = '') => buildListSchema.parse((await client.get(`/api/builds${query}`)).body)

describe('making a build', () => {
  test('empty, owned by whoever made it', async () => {
    const response = await owner.post('/api/builds', { name: '  Shelf one ' })
    expect(response.status).toBe(201)
    const build = openBuildSchema.parse(response.body)
    expect(build).toMatchObject({ name: 'Shelf one', role: 'owner', revision: 1, parts: 0, drives: 0, archived: false })
    expect(build.people).toEqual([{ name: 'Owner', role: 'owner' }])
    expect(buildDocumentSchema.parse(build.document).settings.derating).toBe(0.8)
  })

  test('from an example, under a name of its own', async () => {
    const listed = exampleSchema.array().parse((await owner.get('/api/examples')).body)
    expect(listed).toEqual([{ id: 'two-cables', name: 'Two cables', summary: 'Nothing but two cables', drives: 0 }])
    const response = await owner.post('/api/builds', { name: 'Mine', example: 'two-cables' })
    expect(openBuildSchema.parse(response.body)).toMatchObject({ name: 'Mine', parts: 2 })
  })

  test.each(['no-such', '../two-cables', 'broken', '.'])('not from the example "%s"', async (example) => {
    expect((await owner.post('/api/builds', { name: 'Mine', example })).status).toBe(404)
  })

  test('as a copy of one that may be read', async () => {
    const { id, document } = await importing(owner, cablesDocument('Master', 3))
    const copy = openBuildSchema.parse((await owner.post(`/api/builds/${id}/duplicate`)).body)
    expect(copy.id).not.toBe(id)
    expect(copy.document).toEqual({ ...(document as object), name: 'Copy of Master' })
  })
})

describe('import and export', () => {
  test('give the very same document back', async () => {
    const build = await importing(owner, cablesDocument('Ünïcode & "quotes" / тест', 3))
    const exported = await owner.get(`/api/builds/${build.id}/export`)
    expect(exported.status).toBe(200)
    expect(exported.headers['content-type']).toBe('application/json; charset=utf-8')
    expect(exported.headers['content-disposition']).toBe(
      `attachment; filename="Unicode & quotes.json"; filename*=UTF-8''%C3%9Cn%C3%AFcode%20%26%20quotes%20%D1%82%D0%B5%D1%81%D1%82.json`,
    )
    const again = await importing(owner, JSON.parse(exported.text))
    expect((await owner.get(`/api/builds/${again.id}/export`)).text).toBe(exported.text)
  })

  test('name every error by its place and make nothing', async () => {
    const before = await list(owner)
    const document = {
      ...cablesDocument('Wrong', 2),
      colour: 'red',
      parts: [
        { id: 'p1', model: 'test-data-cable', ref: 'W1' },
        { id: 'p1', model: 'test-data-cable', ref: 'w-2' },
      ],
      joints: [{ id: 'j1', a: { part: 'p1', connector: 'a' } }],
    }
    const response = await owner.post('/api/builds/import', { document })
    expect(response.status).toBe(422)
    const { code, errors } = problemSchema.parse(response.body)
    expect(code).toBe('unreadable-document')
    expect(errors?.map((error) => error.path).sort()).toEqual(['colour', 'joints[0].b', 'parts[1].ref'])
    expect((await list(owner)).total).toBe(before.total)
  })

  test('name references that lead nowhere', async () => {
    const document = {
      ...cablesDocument('Wrong', 2),
      joints: [{ id: 'j1', a: { part: 'p1', connector: 'a' }, b: { part: 'p7', connector: 'a' } }],
    }
    const response = await owner.post('/api/builds/import', { document })
    expect(problemSchema.parse(response.body).errors).toEqual([
      { path: 'joints[0].b.part', message: 'no part "p7" in this document' },
    ])
  })

  test.each([[null], [[]], ['text'], [{}], [{ format: 'other' }], [{ format: 'bayloom-build', version: 99 }]])(
    'refuse %j with a place',
    async (document) => {
      const response = await owner.post('/api/builds/import', { document })
      expect(response.status).toBe(422)
      expect(problemSchema.parse(response.body).errors).toHaveLength(1)
    },
  )
})

describe('the list', () => {
  let reader: Client
  beforeAll(async () => {
    reader = await api.person({ name: 'Lister' })
    for (const [name, cables] of [
      ['beta 50%', 1],
      ['Alpha_one', 5],
      ['gamma', 3],
    ] as const)
      await importing(reader, { ...cablesDocument(name, cables), machine: `RV-${name.slice(0, 1)}` })
  })
  const names = async (query: string) => (await list(reader, query)).items.map((item) => item.name)

  test('shows the last change first, and only one’s own builds', async () => {
    expect(await names('')).toEqual(['gamma', 'Alpha_one', 'beta 50%'])
  })

  test('sorts by name and by worst finding', async () => {
    expect(await names('?sort=name')).toEqual(['Alpha_one', 'beta 50%', 'gamma'])
    await Build.update({ worst: 'danger' }, { where: { name: 'beta 50%' } })
    await Build.update({ worst: 'caution' }, { where: { name: 'gamma' } })
    await Build.update({ worst: null }, { where: { name: 'Alpha_one' } })
    expect(await names('?sort=worst')).toEqual(['beta 50%', 'gamma', 'Alpha_one'])
  })

  test('sorts by number of drives', async () => {
    await Build.update({ drives: 7 }, { where: { name: 'Alpha_one' } })
    expect((await names('?sort=drives'))[0]).toBe('Alpha_one')
  })

  test.each([
    ['GAM', ['gamma']],
    ['rv-b', ['beta 50%']],
    ['50%', ['beta 50%']],
    ['%', ['beta 50%']],
    ['_', ['Alpha_one']],
    ["'; DROP TABLE builds; --", []],
    ['\\', []],
  ])('finds %j', async (search, expected) => {
    expect(await names(`?search=${encodeURIComponent(search)}`)).toEqual(expected)
  })

  test('comes in pages', async () => {
    const page = await list(reader, '?sort=name&pageSize=2&page=2')
    expect(page).toMatchObject({ total: 3, page: 2, pageSize: 2 })
    expect(page.items.map((item) => item.name)).toEqual(['gamma'])
    expect((await list(reader, '?page=9')).items).toEqual([])
  })

  test.each(['?page=0', '?pageSize=1000', '?sort=colour', '?unknown=1', '?page=1&page=2', '?search[x]=1'])(
    'refuses %s',
    async (query) => {
      expect((await reader.get(`/api/builds${query}`)).status).toBe(400)
    },
  )

  test('keeps archived builds apart until they are restored', async () => {
    const [build] = (await list(reader, '?search=gamma')).items
    const archived = await reader.post(`/api/builds/${build?.id}/archive`)
    expect(buildSummarySchema.parse(archived.body).archived).toBe(true)
    expect(await names('?search=gamma')).toEqual([])
    expect(await names('?archived=yes')).toEqual(['gamma'])
    await reader.post(`/api/builds/${build?.id}/restore`)
    expect(await names('?search=gamma')).toEqual(['gamma'])
  })

  test('reads a page from one index, among many builds', async () => {
    await api.context.database.query(
      `INSERT INTO builds (id, name, revision, changed_at)
         SELECT gen_random_uuid(), 'bulk ' || i, 1, now() - i * interval '1 hour' FROM generate_series(1, 3000) i;
       INSERT INTO build_members (build_id, user_id, role)
         SELECT b.id, '${reader.user?.id}', 'owner' FROM builds b WHERE b.name LIKE 'bulk %';
       ANALYZE build_members; ANALYZE builds;`,
    )
    const plan = await api.context.database.query<{ 'QUERY PLAN': string }>(
      `EXPLAIN SELECT build_id FROM build_members WHERE user_id = '${reader.user?.id}' AND archived = false
       ORDER BY changed_at DESC, build_id LIMIT 50`,
      { type: QueryTypes.SELECT },
    )
    const text = plan.map((row) => row['QUERY PLAN']).join('\n')
    expect(text).toContain('build_members_changed')
    expect(text).not.toMatch(/Seq Scan|Sort/)
    const page = await list(reader, '?sort=changed&pageSize=3')
    expect([page.total, page.items.length]).toEqual([3003, 3])
  })
})

describe('the check', () => {
  test('is the same for a saved build and for its document, and is what the list shows', async () => {
    const build = await importing(owner, cablesDocument('Checked', 2))
    const saved = checkResultSchema.parse((await owner.get(`/api/builds/${build.id}/check`)).body)
    const loose = checkResultSchema.parse((await owner.post('/api/check', build.document)).body)
    expect(saved).toEqual(loose)
    expect(saved.build).toEqual({ name: 'Checked', parts: 2, joints: 0, drives: 0 })
    const { accepted: _accepted, ...counts } = saved.counts
    expect(openBuildSchema.parse((await owner.get(`/api/builds/${build.id}`)).body)).toMatchObject({
      worst: saved.worst,
      counts,
    })
  })

  test('of a document that cannot be read names the place', async () => {
    const response = await owner.post('/api/check', { ...cablesDocument('Wrong', 1), parts: 7 })
    expect(response.status).toBe(422)
    expect(problemSchema.parse(response.body).errors?.[0]?.path).toBe('parts')
  })

  test('of a large build comes later, from the check job', async () => {
    const build = await importing(owner, cablesDocument('Large', 500))
    expect(build).toMatchObject({ parts: 500, checked: false })
    await api.context.jobs.drain()
    expect(openBuildSchema.parse((await owner.get(`/api/builds/${build.id}`)).body).checked).toBe(true)
  })
})
