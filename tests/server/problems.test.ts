import { request as rawRequest } from 'node:http'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { problemKinds, problemSchema } from '#shared/contract/problems.ts'
import { openDatabase } from '../../server/db/connection.ts'
import { translateDatabaseError } from '../../server/db/translateError.ts'
import { toRefusal } from '../../server/middleware/errors.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { cablesDocument } from './support/documents.ts'

let api: Api
let person: Client
beforeAll(async () => {
  api = await startApi()
  person = await api.person()
})
afterAll(() => api.close())

/** Reads an answer as problem details and holds it against its own table. */
function problem(response: { status: number; body: unknown; headers: Record<string, string> }) {
  expect(response.headers['content-type']).toBe('application/problem+json; charset=utf-8')
  const read = problemSchema.parse(response.body)
  expect(read.status).toBe(response.status)
  expect(read).toMatchObject({
    ...problemKinds[read.code],
    type: `urn:bayloom:problem:${read.code}`,
  })
  return read
}

const sendText = (text: string, type = 'application/json', path = '/api/builds') =>
  person.send('post', path, text, { 'content-type': type })

describe('a request that cannot be read', () => {
  test.each(['{"name":', 'name', '{"name":"x"}}', "{'name':'x'}", '\u0000'])('as the text %j', async (text) => {
    const { code, errors } = problem(await sendText(text))
    expect(code).toBe('bad-input')
    expect(errors).toEqual([{ path: '', message: 'the body is not JSON' }])
  })

  test('for want of a body', async () => {
    expect(problem(await person.post('/api/builds')).code).toBe('bad-input')
  })

  test('because it is no JSON', async () => {
    expect(problem(await sendText('name=x', 'application/x-www-form-urlencoded')).code).toBe('not-json')
    expect(problem(await sendText('<x/>', 'application/xml')).code).toBe('not-json')
  })

  test('because of an unknown character set or coding', async () => {
    expect(problem(await sendText('{}', 'application/json; charset=klingon')).code).toBe('not-json')
    const coded = await person.send('post', '/api/builds', '{}', {
      'content-type': 'application/json',
      'content-encoding': 'snail',
    })
    expect(problem(coded).code).toBe('not-json')
  })

  test('because it is nested too deep, even two megabytes deep', async () => {
    const deep = (depth: number) => `{"name":${'['.repeat(depth)}${']'.repeat(depth)}}`
    expect(problem(await sendText(deep(100))).errors?.[0]?.message).toContain('nested deeper')
    const document = `{"document":${'['.repeat(1_000_000)}${']'.repeat(1_000_000)}}`
    const response = await sendText(document, 'application/json', '/api/builds/import')
    expect(problem(response).errors?.[0]?.message).toContain('nested deeper')
  })

  test('because it is too large for where it goes', async () => {
    expect(problem(await person.post('/api/builds', { name: 'x'.repeat(70_000) })).code).toBe('too-large')
    const large = { document: { ...cablesDocument('x', 1), note: 'x'.repeat(5_000_000) } }
    expect(problem(await person.post('/api/builds/import', large)).code).toBe('too-large')
  })

  test('because of a NUL or half a character, with the place', async () => {
    for (const text of ['a\u0000b', '\ud800']) {
      const { errors } = problem(await sendText(JSON.stringify({ name: text })))
      expect(errors?.map((error) => error.path)).toEqual(['name'])
    }
    expect((await person.get('/api/builds?search=%00')).body).toMatchObject({ total: 0 })
  })

  test('with every bad place named', async () => {
    const { errors } = problem(await person.post('/api/accounts', { email: 'x', extra: 1 }))
    expect(errors?.map((error) => error.path).sort()).toEqual(['email', 'extra', 'name', 'password'])
  })
})

describe('an address', () => {
  test.each(['/api/nothing', '/api', '/api/builds/x/y/z', '/nothing.js', '/api/builds/not-an-id'])(
    '%s leads nowhere',
    async (path) => {
      expect(problem(await person.get(path)).code).toBe('not-found')
    },
  )

  test('under another method says which there are', async () => {
    const response = await person.put('/api/builds', {})
    expect(problem(response).code).toBe('bad-method')
    expect(response.headers['allow']).toBe('GET, POST')
  })

  test('that cannot be decoded is refused', async () => {
    const status = await new Promise<number | undefined>((resolve, reject) => {
      rawRequest(`${api.url}/api/builds/%ff%fe`, (response) => resolve(response.statusCode))
        .on('error', reject)
        .end()
    })
    expect([400, 404]).toContain(status)
  })
})

describe('what people type', () => {
  test.each(['<script>alert(1)</script>', '"><img src=x onerror=alert(1)>', '{{constructor}}', '${7*7}', '‮txt.exe'])(
    '%s comes back as it was, as JSON that no browser runs',
    async (name) => {
      const response = await person.post('/api/builds', { name })
      expect(response.status).toBe(201)
      expect((response.body as { name: string }).name).toBe(name)
      expect(response.headers['content-type']).toBe('application/json; charset=utf-8')
      expect(response.headers['x-content-type-options']).toBe('nosniff')
    },
  )
})

describe('headers', () => {
  test('keep pages to themselves', async () => {
    const { headers } = await person.get('/api/session')
    expect(headers['content-security-policy']).toContain("default-src 'none'")
    expect(headers['content-security-policy']).toContain("script-src 'self';")
    expect(headers['content-security-policy']).toContain("frame-ancestors 'none'")
    expect(headers['referrer-policy']).toBe('same-origin')
    expect(headers['cache-control']).toBe('no-store')
    expect(headers['x-powered-by']).toBeUndefined()
  })
})

describe('when the database goes away', () => {
  test('requests say so, and the server works again once it is back', async () => {
    const other = await startApi()
    const client = await other.person()
    const open = other.context.database.query.bind(other.context.database)
    const away = openDatabase('postgres://nobody@127.0.0.1:1/none', 1)
    other.context.database.query = away.query.bind(away) as typeof open
    const refused = await client.get('/api/builds')
    expect(problem(refused).code).toBe('unavailable')
    expect(refused.headers['retry-after']).toBe('5')
    expect(refused.text).not.toMatch(/127\.0\.0\.1|ECONN|postgres/)
    other.context.database.query = open
    expect((await client.get('/api/builds')).status).toBe(200)
    await away.close()
    await other.close()
  })

  test('a connection cut by the database is told apart from a mistake of ours', () => {
    const cut = (code: string) => Object.assign(new Error('cut'), { code })
    expect(translateDatabaseError(cut('57P01'))?.code).toBe('unavailable')
    expect(translateDatabaseError(cut('42601'))).toBeNull()
    expect(translateDatabaseError(new Error('Connection terminated unexpectedly'))?.code).toBe('unavailable')
  })
})

test('an error that nobody foresaw is told as nothing but that', () => {
  const refusal = toRefusal(new Error('password of the database is hunter2'))
  expect([refusal.code, refusal.message]).toEqual(['internal', problemKinds.internal.title])
})
