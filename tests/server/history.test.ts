import { randomUUID } from 'node:crypto'
import { QueryTypes } from 'sequelize'
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest'
import { compareBuilds } from '#shared/build/compare.ts'
import { buildDocumentSchema, type BuildDocument } from '#shared/build/document.ts'
import { openBuildSchema, saveAnswerSchema, saveConflictSchema } from '#shared/contract/build.ts'
import { problemSchema } from '#shared/contract/problems.ts'
import { comparisonSchema, openRevisionSchema, revisionSchema } from '#shared/contract/revisions.ts'
import { BuildMember } from '../../server/models/index.ts'
import { contentHash } from '../../server/services/contentHash.ts'
import { readDocument } from '../../server/services/revisionStore.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { addCable, cablesDocument, edit, note, save, serial } from './support/documents.ts'

let api: Api
let owner: Client
let editor: Client
let reader: Client
let buildId: string
let path: string

beforeAll(async () => {
  api = await startApi()
  owner = await api.person({ name: 'Olga' })
  editor = await api.person({ name: 'Edda' })
  reader = await api.person({ name: 'Rea' })
})
afterAll(() => api.close())

beforeEach(async () => {
  buildId = openBuildSchema.parse(
    (await owner.post('/api/builds/import', { document: cablesDocument('Cables', 4) })).body,
  ).id
  path = `/api/builds/${buildId}/revisions`
  await BuildMember.create({ buildId, userId: editor.user?.id ?? '', role: 'editor' })
  await BuildMember.create({ buildId, userId: reader.user?.id ?? '', role: 'reader' })
})

const list = async (query = '', client = owner) =>
  revisionSchema.array().parse((await client.get(`${path}${query}`)).body)
const code = (response: { body: unknown }) => problemSchema.parse(response.body).code
const documentOf = async (revision: number): Promise<BuildDocument> =>
  buildDocumentSchema.parse(openRevisionSchema.parse((await reader.get(`${path}/${revision}`)).body).document)
const happenings = async () =>
  api.context.database.query<{ kind: string; details: unknown }>(
    'SELECT kind, details FROM activity WHERE build_id = $1 ORDER BY id',
    { bind: [buildId], type: QueryTypes.SELECT },
  )

/** So many saves, one note after the other on one part. */
async function saveTimes(count: number, from = 1): Promise<void> {
  for (let i = 0; i < count; i++)
    expect((await owner.post(path, save(from + i, edit(`Note ${i}`, note('p1', `note ${i}`))))).status).toBe(201)
}

describe('many revisions', () => {
  test('are kept as edits, with a whole document now and then and at the end, and each can be read', async () => {
    await saveTimes(120)
    const rows = await api.context.database.query<{ revision: number; whole: boolean; hash: string }>(
      `SELECT revision, document IS NOT NULL AS whole, hash FROM build_revisions WHERE build_id = $1 ORDER BY revision`,
      { bind: [buildId], type: QueryTypes.SELECT },
    )
    expect(rows.filter(({ whole }) => whole).map(({ revision }) => revision)).toEqual([1, 51, 101, 121])
    for (const { revision, hash } of rows)
      expect(contentHash(await readDocument(api.context.database, buildId, revision))).toBe(hash)
    expect((await documentOf(77)).parts[0]?.note).toBe('note 75')
  })

  test('are never shown where they cannot be proved', async () => {
    await saveTimes(3)
    await api.context.database.query(`UPDATE build_revisions SET hash = 'x' WHERE build_id = $1 AND revision = 2`, {
      bind: [buildId],
    })
    await expect(readDocument(api.context.database, buildId, 2)).rejects.toThrow('cannot be made anew')
    expect((await reader.get(`${path}/2`)).status).toBe(500)
  })

  test('from before, each with its document, stay readable and go on', async () => {
    await saveTimes(3)
    const first = await documentOf(1)
    await api.context.database.query(
      `UPDATE build_revisions SET document = $2, replay_from = NULL, hash = $3 WHERE build_id = $1 AND revision = 2`,
      { bind: [buildId, JSON.stringify(first), contentHash(first)] },
    )
    expect(await documentOf(2)).toEqual(first)
    await saveTimes(1, 4)
    expect((await documentOf(4)).parts[0]?.note).toBe('note 2')
  })

  test('are listed newest first, fifty at a time, each page from where the last ended', async () => {
    await saveTimes(60)
    const first = await list('', reader)
    expect(first.map(({ revision }) => revision)).toEqual(Array.from({ length: 50 }, (_, i) => 61 - i))
    const second = await list(`?before=${first.at(-1)?.revision}`)
    expect(second.map(({ revision }) => revision)).toEqual(Array.from({ length: 11 }, (_, i) => 11 - i))
    expect(await list('?before=1')).toEqual([])
  })
})

describe('a name and a note', () => {
  test('are given by editors, shown in the history, found by the filter and taken away again', async () => {
    await saveTimes(2)
    const named = await editor.patch(`${path}/2`, { name: ' As ordered ', note: 'Sent to the shop.' })
    expect(revisionSchema.parse(named.body)).toMatchObject({ name: 'As ordered', note: 'Sent to the shop.' })
    expect((await list('?named=yes', reader)).map(({ revision, name }) => [revision, name])).toEqual([
      [2, 'As ordered'],
    ])
    await editor.patch(`${path}/2`, { note: '' })
    expect((await list()).find(({ revision }) => revision === 2)).toMatchObject({ name: 'As ordered', note: null })
    await editor.patch(`${path}/2`, { name: null })
    expect(await list('?named=yes')).toEqual([])
    expect((await happenings()).filter(({ kind }) => kind === 'revision-named')).toEqual([
      { kind: 'revision-named', details: { revision: 2, name: 'As ordered' } },
      { kind: 'revision-named', details: { revision: 2, name: null } },
    ])
  })

  test('are not given by readers, nor to what is not there', async () => {
    expect(code(await reader.patch(`${path}/1`, { name: 'Mine' }))).toBe('forbidden')
    expect(code(await editor.patch(`${path}/9`, { name: 'Mine' }))).toBe('not-found')
    expect(code(await editor.patch(`${path}/1`, { name: 'x'.repeat(81) }))).toBe('bad-input')
    expect(code(await editor.patch(`${path}/1`, { label: 'x' }))).toBe('bad-input')
  })

  test('stay after the account of the author is gone', async () => {
    await api.context.database.query('UPDATE build_revisions SET author_id = NULL WHERE build_id = $1', {
      bind: [buildId],
    })
    expect(await list()).toMatchObject([{ savedBy: null, label: 'Import' }])
  })
})

describe('restoring a revision', () => {
  const restore = (revision: number, base: number, client = owner) =>
    client.post(`${path}/${revision}/restore`, { base, requestId: randomUUID() })

  test('brings its content back as a new revision, and is told as that', async () => {
    await owner.post(path, save(1, edit('Add', addCable(9)), edit('Note', note('p1', 'new'))))
    const response = await restore(1, 2)
    expect(response.status).toBe(201)
    expect(saveAnswerSchema.parse(response.body)).toMatchObject({ revision: 3, merged: [] })
    expect(compareBuilds(await documentOf(1), await documentOf(3))).toEqual([])
    expect((await list())[0]).toMatchObject({ revision: 3, restored: 1, label: 'Restore revision 1' })
    expect((await happenings()).map(({ kind, details }) => [kind, details])).toEqual([
      ['revision-saved', { revision: 2, label: 'Add; Note' }],
      ['revision-restored', { revision: 3, restored: 1 }],
    ])
    expect((await restore(2, 3)).status).toBe(201)
    expect(compareBuilds(await documentOf(2), await documentOf(4))).toEqual([])
  })

  test('is merged with what others did elsewhere meanwhile', async () => {
    await owner.post(path, save(1, edit('Note', note('p1', 'new'))))
    await editor.post(path, save(2, edit('Serial', serial('p2', 'RV-2'))))
    expect((await restore(1, 2)).status).toBe(201)
    expect((await documentOf(4)).parts.slice(0, 2)).toMatchObject([{ note: 'cable 1' }, { serial: 'RV-2' }])
  })

  test('is refused where others changed the same meanwhile, with both sides', async () => {
    await owner.post(path, save(1, edit('Note', note('p1', 'new'))))
    await editor.post(path, save(2, edit('Theirs', note('p1', 'theirs'))))
    const response = await restore(1, 2)
    expect(response.status).toBe(409)
    expect(saveConflictSchema.parse(response.body)).toMatchObject({ revision: 3, clashes: ['parts/p1/note'] })
    expect((await documentOf(3)).parts[0]?.note).toBe('theirs')
  })

  test('is answered once, however often the request comes', async () => {
    await owner.post(path, save(1, edit('Note', note('p1', 'new'))))
    const request = { base: 2, requestId: randomUUID() }
    const [first, second] = [
      await owner.post(`${path}/1/restore`, request),
      await owner.post(`${path}/1/restore`, request),
    ]
    expect(second.body).toEqual(first.body)
    expect(await list()).toHaveLength(3)
  })

  test('says where there is nothing to do, nothing to restore, or no right to', async () => {
    await owner.post(path, save(1, edit('Note', note('p1', 'new'))))
    expect(code(await restore(2, 2))).toBe('already-there')
    expect(code(await restore(7, 2))).toBe('not-found')
    expect(code(await restore(1, 2, reader))).toBe('forbidden')
  })

  test('lets others who were at work merge over it', async () => {
    await owner.post(path, save(1, edit('Note', note('p1', 'new'))))
    await restore(1, 2)
    const late = await editor.post(path, save(2, edit('Serial', serial('p2', 'RV-2'))))
    expect(late.status).toBe(201)
    expect((await documentOf(4)).parts.slice(0, 2)).toMatchObject([{ note: 'cable 1' }, { serial: 'RV-2' }])
  })
})

describe('a comparison', () => {
  const compare = async (query: string, client = reader) => client.get(`/api/builds/${buildId}/comparison?${query}`)

  test('tells what changed in words, and what the checker says of either', async () => {
    await owner.post(path, save(1, edit('Add', addCable(9)), edit('Note', note('p1', 'new'))))
    const compared = comparisonSchema.parse((await compare('from=1')).body)
    expect([compared.from.revision, compared.to.revision]).toEqual([1, 2])
    expect(compared.changes.map(({ text }) => text)).toEqual([
      'W1: note changed from cable 1 to new.',
      expect.stringMatching(/^W9 added: /),
    ])
    expect(compared.results).not.toBeNull()
    const back = comparisonSchema.parse((await compare('from=2&to=1')).body)
    expect(back.changes[0]?.text).toMatch(/^W9 removed: /)
    expect(back.results?.gained).toEqual(compared.results?.lost)
    expect(comparisonSchema.parse((await compare('from=1&to=2')).body)).toEqual(compared)
  })

  test('is for people of the build, of revisions that are there', async () => {
    expect((await compare('from=1', await api.person())).status).toBe(404)
    expect((await compare('from=1&to=9')).status).toBe(404)
    expect(code(await compare('to=1'))).toBe('bad-input')
  })
})
