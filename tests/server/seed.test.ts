import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import type { BuildDocumentInput } from '#shared/build/document.ts'
import { buildListSchema, openBuildSchema } from '#shared/contract/build.ts'
import { sessionSchema } from '#shared/contract/session.ts'
import { demoAccounts } from '../../server/db/demoAccounts.ts'
import { seedDemo } from '../../server/db/seed.ts'
import { Build, BuildRevision, User } from '../../server/models/index.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { cablesDocument, edit, note, save } from './support/documents.ts'

const examples = mkdtempSync(join(tmpdir(), 'bayloom-examples-'))
const write = (id: string, document: BuildDocumentInput) => {
  mkdirSync(join(examples, id), { recursive: true })
  writeFileSync(join(examples, id, 'build.json'), JSON.stringify(document))
}
let api: Api

beforeAll(async () => {
  write('kept', cablesDocument('Kept', 1))
  write('edited', cablesDocument('Edited', 1))
  api = await startApi({ settings: { EXAMPLES_DIR: examples, BAYLOOM_DEMO: '1' } })
  await seedDemo(api.context)
})
afterAll(async () => {
  await api.close()
  rmSync(examples, { recursive: true })
})

async function signIn(email: string): Promise<Client> {
  const account = demoAccounts.find((demo) => demo.email === email)
  const client = await api.visitor()
  const response = await client.post('/api/session', { email, password: account?.password })
  expect(response.status).toBe(200)
  await client.refreshToken()
  return client
}
const builds = async (client: Client) => buildListSchema.parse((await client.get('/api/builds?sort=name')).body).items

describe('the demo', () => {
  test('names its accounts with their passwords, and each of them signs in with its role', async () => {
    const visitor = await api.visitor()
    const session = sessionSchema.parse((await visitor.get('/api/session')).body)
    expect(session.demoAccounts.map((account) => account.email)).toEqual(demoAccounts.map((account) => account.email))
    for (const account of demoAccounts) {
      expect(account.email).toMatch(/\.example$/)
      const client = await signIn(account.email)
      const { user } = sessionSchema.parse((await client.get('/api/session')).body)
      expect(user?.role).toBe(account.role)
      const roles = new Set((await builds(client)).map((build) => build.role))
      expect([...roles]).toEqual(account.buildRole === null ? [] : [account.buildRole])
    }
  })

  test('does not count as the first account', async () => {
    const visitor = await api.visitor()
    expect(sessionSchema.parse((await visitor.get('/api/session')).body).firstAccount).toBe(true)
    const password = 'a reel of leader tape'
    const response = await visitor.post('/api/accounts', { email: 'real@example.org', name: 'Real', password })
    expect(sessionSchema.parse(response.body).user?.role).toBe('administrator')
  })

  test('loaded again changes nothing', async () => {
    const before = [await Build.findAll({ order: ['id'] }), await User.count(), await BuildRevision.count()]
    await seedDemo(api.context)
    expect([await Build.findAll({ order: ['id'] }), await User.count(), await BuildRevision.count()]).toEqual(before)
  })

  test('renews an example whose file changed, and never a build that somebody edited', async () => {
    const owner = await signIn('irma@reelvault.example')
    const [edited, kept] = await builds(owner)
    const path = `/api/builds/${edited?.id}/revisions`
    expect((await owner.post(path, save(1, edit('Mine', note('p1', 'mine'))))).status).toBe(201)
    write('kept', cablesDocument('Kept', 3))
    write('edited', cablesDocument('Edited', 3))
    await seedDemo(api.context)
    const open = async (id = '') => openBuildSchema.parse((await owner.get(`/api/builds/${id}`)).body)
    expect(await open(kept?.id)).toMatchObject({ revision: 2, parts: 3 })
    expect(await open(edited?.id)).toMatchObject({ revision: 2, parts: 1 })
    const stale = await owner.post(`/api/builds/${kept?.id}/revisions`, save(1, edit('Stale', note('p1', 'stale'))))
    expect(stale.status).toBe(409)
  })
})

test('without the demo its accounts are shut out, and their sessions with them', async () => {
  const client = await signIn('irma@reelvault.example')
  api.context.config.demo = false
  expect((await client.get('/api/builds')).status).toBe(401)
  const visitor = await api.visitor()
  const { email, password } = demoAccounts[0] ?? { email: '', password: '' }
  expect((await visitor.post('/api/session', { email, password })).status).toBe(401)
  expect(sessionSchema.parse((await visitor.get('/api/session')).body).demoAccounts).toEqual([])
})
