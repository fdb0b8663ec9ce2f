import pg from 'pg'
import { afterAll, beforeAll, expect, test } from 'vitest'
import { apply } from '#shared/build/apply.ts'
import type { BuildDocument } from '#shared/build/document.ts'
import type { Edit } from '#shared/build/changes.ts'
import { openBuildSchema, saveAnswerSchema } from '#shared/contract/build.ts'
import { contentHash } from '../../server/services/contentHash.ts'
import { startProduct, type Product } from '../helpers/server.ts'
import { makeClient, type Client } from './support/api.ts'
import { addCable, cablesDocument, edit, save } from './support/documents.ts'

let product: Product
let database: pg.Client
beforeAll(async () => {
  product = await startProduct({ demo: false })
  database = new pg.Client({ connectionString: product.databaseUrl })
  await database.connect()
})
afterAll(async () => {
  await database.end()
  await product.stop()
})

async function register(): Promise<Client> {
  const client = makeClient(product.url)
  await client.refreshToken()
  const account = { email: 'crash@example.org', name: 'Crash', password: 'a reel of leader tape' }
  expect((await client.post('/api/accounts', account)).status).toBe(201)
  await client.refreshToken()
  return client
}

interface Row {
  revision: number
  document: BuildDocument | null
  hash: string
  edits: Edit[]
}

test('a server killed during a hundred saves loses none that it acknowledged, leaves none half, and keeps sessions', async () => {
  const client = await register()
  const made = await client.post('/api/builds/import', { document: cablesDocument('Killed', 3) })
  const { id } = openBuildSchema.parse(made.body)
  const acknowledged = new Map<number, string>()
  let number = 10

  for (let round = 0; round < 2; round++) {
    const { revision } = openBuildSchema.parse((await client.get(`/api/builds/${id}`)).body)
    const goal = acknowledged.size + 45 + 10 * round
    let killed: Promise<void> | undefined
    const saver = async () => {
      while (!killed) {
        const request = save(revision, edit(`Add W${++number}`, addCable(number)))
        const response = await client.post(`/api/builds/${id}/revisions`, request).catch(() => null)
        if (response?.status !== 201) continue
        acknowledged.set(saveAnswerSchema.parse(response.body).revision, request.requestId)
        if (acknowledged.size >= goal) killed ??= product.kill()
      }
    }
    await Promise.all([saver(), saver(), saver(), saver()])
    await killed
    await product.start()
  }

  const rows = (
    await database.query<Row & { request_id: string }>(
      'SELECT revision, document, hash, edits, request_id FROM build_revisions WHERE build_id = $1 ORDER BY revision',
      [id],
    )
  ).rows
  for (const [revision, requestId] of acknowledged) expect(rows[revision - 1]?.request_id).toBe(requestId)
  expect(rows.map((row) => row.revision)).toEqual(rows.map((_, i) => i + 1))
  // Every revision made anew from the first by its edits is what was saved; those kept whole say the same.
  let document = rows[0]?.document
  for (const [i, row] of rows.entries()) {
    if (!document) throw new Error('the first revision is kept whole')
    if (i > 0)
      document = apply(
        document,
        row.edits.flatMap((done) => done.changes),
      )
    expect(row.hash).toBe(contentHash(document))
    if (row.document) expect(row.document).toEqual(document)
  }
  expect(rows.at(-1)?.document).toEqual(document)
  const newest = await client.get(`/api/builds/${id}`)
  expect(openBuildSchema.parse(newest.body).revision).toBe(rows.length)
}, 180_000)
