import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest'
import { buildDocumentSchema, type BuildDocument } from '#shared/build/document.ts'
import { openBuildSchema, saveAnswerSchema, saveConflictSchema } from '#shared/contract/build.ts'
import { problemSchema } from '#shared/contract/problems.ts'
import { revisionSchema } from '#shared/contract/revisions.ts'
import { BuildMember } from '../../server/models/index.ts'
import { readDocument } from '../../server/services/revisionStore.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { addCable, cablesDocument, edit, note, save, serial } from './support/documents.ts'

let api: Api
let owner: Client
let editor: Client
let buildId: string
let path: string

beforeAll(async () => {
  api = await startApi()
  ;[owner, editor] = [await api.person({ name: 'Owner' }), await api.person({ name: 'Editor' })]
})
afterAll(() => api.close())

beforeEach(async () => {
  const made = await owner.post('/api/builds/import', { document: cablesDocument('Cables', 4) })
  buildId = openBuildSchema.parse(made.body).id
  path = `/api/builds/${buildId}/revisions`
  await BuildMember.create({ buildId, userId: editor.user?.id ?? '', role: 'editor' })
})

async function newest(): Promise<{ revision: number; document: BuildDocument }> {
  const { revision, document } = openBuildSchema.parse((await owner.get(`/api/builds/${buildId}`)).body)
  return { revision, document: buildDocumentSchema.parse(document) }
}
const noteOf = (document: BuildDocument, id: string) => document.parts.find((part) => part.id === id)?.note

describe('a save', () => {
  test('is a revision with its author, its words and its content', async () => {
    const response = await editor.post(
      path,
      save(1, edit('Note on W1', note('p1', 'new')), edit('Add W5', addCable(5))),
    )
    expect(response.status).toBe(201)
    const answer = saveAnswerSchema.parse(response.body)
    expect(answer).toMatchObject({ revision: 2, merged: [] })
    const { document, revision } = await newest()
    expect(revision).toBe(2)
    expect(noteOf(document, 'p1')).toBe('new')
    expect(document.parts.map((part) => part.ref)).toEqual(['W1', 'W2', 'W3', 'W4', 'W5'])
    const history = revisionSchema.array().parse((await owner.get(path)).body)
    expect(history.map(({ revision, savedBy, label }) => ({ revision, savedBy, label }))).toEqual([
      { revision: 2, savedBy: 'Editor', label: 'Note on W1; Add W5' },
      { revision: 1, savedBy: 'Owner', label: 'Import' },
    ])
    expect(history[0]?.hash).not.toBe(history[1]?.hash)
    const summary = openBuildSchema.parse((await owner.get(`/api/builds/${buildId}`)).body)
    expect(summary).toMatchObject({ parts: 5, changedBy: 'Editor', changedAt: answer.savedAt, checked: true })
  })

  test('sent again after a lost answer is not done again, and is answered as the first time', async () => {
    await editor.post(path, save(1, edit('Theirs', note('p2', 'theirs'))))
    const request = save(1, edit('Ours', addCable(5)))
    const first = await owner.post(path, request)
    await editor.post(path, save(3, edit('Later', note('p3', 'later'))))
    const second = await owner.post(path, request)
    expect(second.status).toBe(201)
    expect(second.body).toEqual(first.body)
    expect((await newest()).revision).toBe(4)
  })

  test('sent twice at the same moment is done once', async () => {
    const request = save(1, edit('Ours', addCable(5)))
    const answers = await Promise.all([owner.post(path, request), owner.post(path, request)])
    expect(answers.map((answer) => answer.status)).toEqual([201, 201])
    expect(answers[0].body).toEqual(answers[1].body)
    expect((await newest()).revision).toBe(2)
  })

  test('by two people at once keeps both, whoever comes first', async () => {
    const answers = await Promise.all([
      owner.post(path, save(1, edit('Ours', note('p1', 'ours')))),
      editor.post(path, save(1, edit('Theirs', note('p2', 'theirs')))),
    ])
    expect(answers.map((answer) => answer.status)).toEqual([201, 201])
    const { document, revision } = await newest()
    expect([revision, noteOf(document, 'p1'), noteOf(document, 'p2')]).toEqual([3, 'ours', 'theirs'])
  })

  test('by many at once loses nothing', async () => {
    const clients = [owner, editor]
    const notes = Array.from({ length: 12 }, (_, i) => `p${(i % 4) + 1}/${i}`)
    const answers = await Promise.all(
      notes.map((text, i) => clients[i % 2]?.post(path, save(1, edit(text, addCable(100 + i))))),
    )
    expect(answers.map((answer) => answer?.status)).toEqual(notes.map(() => 201))
    const { document, revision } = await newest()
    expect(revision).toBe(13)
    expect(document.parts).toHaveLength(16)
    const numbers = Array.from({ length: 13 }, (_, i) => i + 1)
    const documents = await Promise.all(numbers.map((n) => readDocument(api.context.database, buildId, n)))
    expect(documents.map(({ parts }) => parts.length)).toEqual(numbers.map((n) => 3 + n))
  })
})

describe('a save from an older base', () => {
  test('is merged where it touches other fields, and says what it was merged with', async () => {
    const theirs = edit('Serial of W1', serial('p1', 'ABC123'))
    await editor.post(path, save(1, theirs))
    const response = await owner.post(path, save(1, edit('Note on W1', note('p1', 'ours'))))
    expect(saveAnswerSchema.parse(response.body)).toMatchObject({ revision: 3, merged: [theirs] })
    const { document } = await newest()
    expect(document.parts[0]).toMatchObject({ serial: 'ABC123', note: 'ours' })
  })

  test('is refused where it writes the same field, with both sides and nothing saved', async () => {
    const theirs = edit('Theirs', note('p1', 'theirs'))
    await editor.post(path, save(1, theirs))
    const response = await owner.post(path, save(1, edit('Ours', note('p1', 'ours'), note('p2', 'ours'))))
    expect(response.status).toBe(409)
    expect(problemSchema.parse(response.body).code).toBe('conflict')
    const conflict = saveConflictSchema.parse(response.body)
    expect(conflict).toMatchObject({ revision: 2, theirs: [theirs], clashes: ['parts/p1/note'] })
    expect(noteOf(buildDocumentSchema.parse(conflict.document), 'p1')).toBe('theirs')
    expect(noteOf((await newest()).document, 'p2')).toBe('cable 2')
  })

  test.each([
    ['a part that the others took away', { op: 'removePart', id: 'p1' }, note('p1', 'ours'), ['parts/p1']],
    [
      'a joint to a part that the others took away',
      { op: 'removePart', id: 'p1' },
      { op: 'addJoint', joint: { id: 'j1', a: { part: 'p1', connector: 'a' }, b: { part: 'p2', connector: 'a' } } },
      ['parts/p1'],
    ],
    [
      'the same designation for two parts',
      addCable(7),
      { ...addCable(7), part: { id: 'q', model: 'test-data-cable', ref: 'W7' } },
      ['refs/W7'],
    ],
  ] as const)('is refused over %s', async (_what, theirs, ours, clashes) => {
    await editor.post(path, save(1, edit('Theirs', theirs)))
    const response = await owner.post(path, save(1, edit('Ours', ours as never)))
    expect(response.status).toBe(409)
    expect(saveConflictSchema.parse(response.body).clashes).toEqual(clashes)
  })

  test('can be sent again from the newest base once a person has chosen', async () => {
    await editor.post(path, save(1, edit('Theirs', note('p1', 'theirs'))))
    const ours = edit('Ours', note('p1', 'ours'))
    expect((await owner.post(path, save(1, ours))).status).toBe(409)
    expect((await owner.post(path, save(2, ours))).status).toBe(201)
    expect(noteOf((await newest()).document, 'p1')).toBe('ours')
  })
})

describe('a save that does not fit', () => {
  const refused = async (...edits: Parameters<typeof save>[1][]) => {
    const response = await owner.post(path, save(1, ...edits))
    expect((await newest()).revision).toBe(1)
    return { status: response.status, errors: problemSchema.parse(response.body).errors }
  }

  test('names the change', async () => {
    const answer = await refused(edit('Fine', note('p1', 'x')), edit('Not', note('p2', 'x'), note('p99', 'x')))
    expect(answer).toEqual({ status: 400, errors: [{ path: 'edits[1].changes[1]', message: 'no part "p99"' }] })
  })

  test('names a reference that leads nowhere', async () => {
    const part = { id: 'p9', model: 'no-such-model', ref: 'W9' }
    const answer = await refused(edit('Add', { op: 'addPart', part }))
    expect(answer.status).toBe(400)
    expect(answer.errors?.[0]?.path).toBe('parts[4].model')
  })

  test('names a designation given twice', async () => {
    const answer = await refused(
      edit('Add', { op: 'addPart', part: { id: 'p9', model: 'test-data-cable', ref: 'W1' } }),
    )
    expect(answer.errors?.[0]).toEqual({ path: 'parts[4].ref', message: '"W1" is already used by parts[0]' })
  })

  test('names a base that is not there yet', async () => {
    const response = await owner.post(path, save(7, edit('Ours', note('p1', 'x'))))
    expect(response.status).toBe(400)
    expect(problemSchema.parse(response.body).errors?.[0]?.path).toBe('base')
  })
})

test('every revision can be read with its document', async () => {
  await owner.post(path, save(1, edit('Note', note('p1', 'second'))))
  const read = async (revision: number) => {
    const { body } = await owner.get(`${path}/${revision}`)
    return noteOf(buildDocumentSchema.parse((body as { document: unknown }).document), 'p1')
  }
  expect([await read(1), await read(2)]).toEqual(['cable 1', 'second'])
  expect((await owner.get(`${path}/3`)).status).toBe(404)
  expect((await owner.get(`/api/builds/${randomUUID()}/revisions`)).status).toBe(404)
})
