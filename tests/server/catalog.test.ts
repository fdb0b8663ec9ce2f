import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import type { Catalog } from '#shared/catalog/catalog.ts'
import type { Model } from '#shared/catalog/model.ts'
import { openBuildSchema } from '#shared/contract/build.ts'
import { catalogAnswerSchema, ownModelSchema } from '#shared/contract/catalog.ts'
import { problemSchema } from '#shared/contract/problems.ts'
import { CatalogRevision } from '../../server/models/index.ts'
import { loadCatalogFiles } from '../../server/services/catalogFiles.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { testCable } from './support/documents.ts'

let api: Api
let editor: Client
let member: Client
beforeAll(async () => {
  api = await startApi()
  editor = await api.person({ role: 'catalog-editor' })
  member = await api.person()
})
afterAll(() => api.close())

const catalog = async (client: Client): Promise<Catalog> =>
  catalogAnswerSchema.parse((await client.get('/api/catalog')).body)
const put = (client: Client, model: unknown, id = 'test-data-cable') =>
  client.put(`/api/catalog/models/${id}`, { model })
const errorsOf = (response: { body: unknown }) => problemSchema.parse(response.body).errors?.map((error) => error.path)

function shippedCable(): Model {
  const model = loadCatalogFiles().models.find(({ kind, connectors }) => kind === 'cable' && connectors.length > 1)
  if (!model) throw new Error('the catalog ships no cable')
  return model
}

describe('the catalog', () => {
  test('is what the files hold, and is sent once for as long as it stays the same', async () => {
    const visitor = await api.visitor()
    const first = await visitor.get('/api/catalog')
    expect(first.body).toEqual(loadCatalogFiles())
    const etag = first.headers['etag'] ?? ''
    expect(etag).toMatch(/^"[\w-]{24}"$/)
    for (const known of [etag, `W/${etag}`, `"other", ${etag}`]) {
      const again = await visitor.get('/api/catalog', { 'if-none-match': known })
      expect([again.status, again.text]).toEqual([304, ''])
    }
    expect((await visitor.get('/api/catalog', { 'if-none-match': '"other"' })).status).toBe(200)
  })

  test('takes a new model and a correction, keeps both as revisions, and leaves the files alone', async () => {
    const before = (await editor.get('/api/catalog')).headers['etag']
    expect((await put(editor, testCable)).status).toBe(200)
    expect((await put(editor, { ...testCable, name: 'Corrected' })).status).toBe(200)
    const after = await editor.get('/api/catalog')
    expect(after.headers['etag']).not.toBe(before)
    const models = catalogAnswerSchema.parse(after.body).models
    expect(models.filter((model) => model.id === testCable.id).map((model) => model.name)).toEqual(['Corrected'])
    const revisions = await CatalogRevision.findAll({ where: { modelId: testCable.id }, order: ['id'] })
    expect(revisions.map(({ model, authorId }) => [model.name, authorId])).toEqual([
      [testCable.name, editor.user?.id],
      ['Corrected', editor.user?.id],
    ])
    expect(loadCatalogFiles().models.some((model) => model.id === testCable.id)).toBe(false)
  })

  test('corrects a shipped model in its place', async () => {
    const shipped = shippedCable()
    const place = (await catalog(member)).models.findIndex((model) => model.id === shipped.id)
    expect((await put(editor, { ...shipped, name: 'Corrected cable' }, shipped.id)).status).toBe(200)
    expect((await catalog(member)).models[place]).toMatchObject({ id: shipped.id, name: 'Corrected cable' })
  })

  test('keeps every connector that a build may be joined to', async () => {
    const shipped = shippedCable()
    const model = { ...shipped, connectors: shipped.connectors.slice(1), lanes: [], wiring: [] }
    const response = await put(editor, model, shipped.id)
    expect(response.status).toBe(400)
    expect(JSON.stringify(problemSchema.parse(response.body).errors)).toContain(
      `connector \\"${shipped.connectors[0]?.id}\\" has to stay`,
    )
  })

  test.each([
    ['another id than the address', { ...testCable, id: 'other' }, ['model.id']],
    [
      'a connector type that is not there',
      { ...testCable, connectors: [...(testCable.connectors ?? []), { id: 'c', label: 'C', type: 'no-such-type' }] },
      ['model.connectors[2].type'],
    ],
    ['a source that is not there', { ...testCable, sources: ['no-such-source'] }, ['model.sources[0]']],
    ['an unknown field', { ...testCable, colour: 'red' }, ['model.colour']],
  ])('refuses %s', async (_what, model, paths) => {
    const response = await put(editor, model)
    expect(response.status).toBe(400)
    expect(errorsOf(response)).toEqual(paths)
  })

  test('has builds that name a corrected model checked anew, and no others', async () => {
    const shipped = shippedCable()
    const document = (name: string, parts: object[]) => ({
      format: 'bayloom-build',
      version: 1,
      name,
      parts,
      joints: [],
    })
    const make = async (name: string, parts: object[]) => {
      const response = await member.post('/api/builds/import', { document: document(name, parts) })
      return openBuildSchema.parse(response.body).id
    }
    const naming = await make('Naming', [{ id: 'w1', ref: 'W1', model: shipped.id }])
    const other = await make('Other', [])
    const isChecked = async (id: string) => openBuildSchema.parse((await member.get(`/api/builds/${id}`)).body).checked
    await put(editor, { ...shipped, name: 'Corrected once more' }, shipped.id)
    expect([await isChecked(naming), await isChecked(other)]).toEqual([false, true])
    await api.context.jobs.drain()
    expect(await isChecked(naming)).toBe(true)
  })

  test('is not changed by members', async () => {
    expect((await put(member, testCable)).status).toBe(403)
  })
})

describe('own models', () => {
  const putOwn = (client: Client, model: unknown, id = 'test-data-cable') =>
    client.put(`/api/own-models/${id}`, { model })
  const own = async (client: Client) => ownModelSchema.array().parse((await client.get('/api/own-models')).body)

  test('belong to one person, are written over and removed', async () => {
    const other = await api.person()
    expect(ownModelSchema.parse((await putOwn(member, testCable)).body).id).toBe(testCable.id)
    await putOwn(member, { ...testCable, name: 'Mine' })
    expect((await own(member)).map(({ model }) => model.name)).toEqual(['Mine'])
    expect(await own(other)).toEqual([])
    expect((await other.delete('/api/own-models/test-data-cable')).status).toBe(404)
    expect((await member.delete('/api/own-models/test-data-cable')).status).toBe(204)
    expect(await own(member)).toEqual([])
  })

  test('name what does not fit the connector types', async () => {
    const connectors = [{ id: 'a', label: 'A', type: 'no-such-type' }]
    expect(errorsOf(await putOwn(member, { ...testCable, connectors }))).toEqual(['model.connectors[0].type'])
    expect(errorsOf(await putOwn(member, testCable, 'other'))).toEqual(['model.id'])
  })
})
