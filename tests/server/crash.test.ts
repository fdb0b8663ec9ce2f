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
import { startMailSink, type MailSink } from './support/mailSink.ts'

let product: Product
let sink: MailSink
let database: pg.Client
beforeAll(async () => {
  sink = await startMailSink()
  product = await startProduct({ demo: false, settings: { SMTP_URL: sink.url } })
  database = new pg.Client({ connectionString: product.databaseUrl })
  await database.connect()
})
afterAll(async () => {
  await database.end()
  await product.stop()
  await sink.close()
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

/** How many saves are acknowledged before each kill, and at the end. */
const goals = [30, 65, 100]

test('a server killed during a hundred saves and invitations keeps what it acknowledged, loses no mail and sends none twice', async () => {
  const client = await register()
  const made = await client.post('/api/builds/import', { document: cablesDocument('Killed', 3) })
  const { id } = openBuildSchema.parse(made.body)
  const acknowledged = new Map<number, string>()
  const invited = new Set<string>()
  let number = 10
  let guest = 0

  for (const goal of goals) {
    const { revision } = openBuildSchema.parse((await client.get(`/api/builds/${id}`)).body)
    let over: Promise<void> | undefined
    const saver = async () => {
      while (!over) {
        const request = save(revision, edit(`Add W${++number}`, addCable(number)))
        const response = await client.post(`/api/builds/${id}/revisions`, request).catch(() => null)
        if (response?.status !== 201) continue
        acknowledged.set(saveAnswerSchema.parse(response.body).revision, request.requestId)
        if (acknowledged.size >= goal) over ??= goal === goals.at(-1) ? Promise.resolve() : product.kill()
      }
    }
    const inviter = async () => {
      while (!over) {
        const email = `guest${++guest}@example.org`
        const response = await client.post(`/api/builds/${id}/invitations`, { email, role: 'reader' }).catch(() => null)
        if (response?.status === 201) invited.add(email)
      }
    }
    await Promise.all([saver(), saver(), saver(), inviter()])
    await over
    if (goal !== goals.at(-1)) await product.start()
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
  const told = await database.query<{ revision: number }>(
    `SELECT (details ->> 'revision')::int AS revision FROM activity WHERE build_id = $1 AND kind = 'revision-saved' ORDER BY id`,
    [id],
  )
  // The first revision is the import; each later one is told of once, in the order in which it came about.
  expect(told.rows.map((row) => row.revision)).toEqual(rows.slice(1).map((row) => row.revision))

  const waiting = async () =>
    (await database.query("SELECT 1 FROM messages WHERE state <> 'sent' LIMIT 1")).rowCount ?? 0
  await expect.poll(waiting, { timeout: 60_000, interval: 200 }).toBe(0)
  const written = (await database.query<{ id: string; recipient: string }>('SELECT id, recipient FROM messages')).rows
  const recipients = written.map((row) => row.recipient)
  expect(new Set(recipients).size).toBe(recipients.length)
  for (const email of invited) expect(recipients).toContain(email)
  const ids = (list: readonly string[]) => [...new Set(list)].sort()
  expect(ids(sink.taken.map((mail) => mail.messageId))).toEqual(ids(written.map((row) => `${row.id}@bayloom`)))
  // A mail server may have taken the one mail over that was under way at a kill; it gets it again as the same mail.
  expect(sink.taken.length - written.length).toBeLessThanOrEqual(goals.length - 1)
}, 180_000)
