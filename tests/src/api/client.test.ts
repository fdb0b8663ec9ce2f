import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { z } from 'zod'
import { connectSession, request, requestNothing } from '../../../src/api/client.ts'
import { NetworkError, ProblemError, UnexpectedAnswerError } from '../../../src/api/errors.ts'
import { fakeServer, json, problem } from '../helpers/fakeServer.ts'

const schema = z.object({ name: z.string() })
let token = 'old'
const signInAgain = vi.fn(async () => false)

beforeEach(() => {
  token = 'old'
  signInAgain.mockReset().mockResolvedValue(false)
  connectSession({
    csrfToken: () => token,
    renewToken: async () => {
      token = 'fresh'
    },
    signInAgain,
  })
})
afterEach(() => vi.unstubAllGlobals())

describe('a request', () => {
  it('gives the parsed answer and leaves out empty query values', async () => {
    const server = fakeServer({ 'GET /api/things': json({ name: 'T1', more: true }) })
    expect(await request(schema, 'GET', '/api/things', { query: { search: '', page: 2, sort: undefined } })).toEqual({
      name: 'T1',
    })
    expect(server.seen[0]?.path).toBe('/api/things?page=2')
  })

  it('carries the token when it changes something, and not when it reads', async () => {
    const server = fakeServer({ 'GET /api/things': json({ name: 'a' }), 'POST /api/things': json({ name: 'b' }, 201) })
    await request(schema, 'GET', '/api/things')
    await request(schema, 'POST', '/api/things', { body: { name: 'b' } })
    expect(server.seen.map((one) => one.csrf)).toEqual([null, 'old'])
    expect(server.seen[1]?.body).toEqual({ name: 'b' })
  })

  it('takes an answer without a body where nothing is awaited', async () => {
    fakeServer({ 'DELETE /api/things/1': json(null, 204) })
    await expect(requestNothing('DELETE', '/api/things/1')).resolves.toBeUndefined()
  })
})

describe('a refusal', () => {
  it('is told by its code, with each bad place by its path', async () => {
    const errors = [{ path: 'parts[3].bay.slot', message: 'there is no bay 13' }]
    fakeServer({ 'POST /api/things': problem('unreadable-document', { detail: 'Nothing was imported', errors }) })
    const refusal = await request(schema, 'POST', '/api/things').catch((error: unknown) => error)
    expect(refusal).toBeInstanceOf(ProblemError)
    expect(refusal).toMatchObject({ code: 'unreadable-document', status: 422, message: 'Nothing was imported', errors })
  })

  it('keeps the whole answer, for conflicts', async () => {
    fakeServer({ 'POST /api/things': problem('conflict', { revision: 7, clashes: ['p1'] }) })
    const refusal = await request(schema, 'POST', '/api/things').catch((error: unknown) => error)
    expect(refusal).toMatchObject({ code: 'conflict', body: { revision: 7, clashes: ['p1'] } })
  })

  it('differs from no answer at all', async () => {
    fakeServer({
      'GET /api/things': () => {
        throw new TypeError('Failed to fetch')
      },
    })
    await expect(request(schema, 'GET', '/api/things')).rejects.toBeInstanceOf(NetworkError)
  })

  it('differs from an answer of another shape', async () => {
    fakeServer({ 'GET /api/things': [json({ title: 'proxy' }), new Response('<html>', { status: 502 })] })
    await expect(request(schema, 'GET', '/api/things')).rejects.toBeInstanceOf(UnexpectedAnswerError)
    await expect(request(schema, 'GET', '/api/things')).rejects.toMatchObject({
      name: 'UnexpectedAnswerError',
      status: 502,
    })
  })
})

describe('a stale token', () => {
  it('is renewed once and the request goes through', async () => {
    const server = fakeServer({ 'POST /api/things': [problem('forged-request'), json({ name: 'b' }, 201)] })
    await request(schema, 'POST', '/api/things')
    expect(server.seen.map((one) => one.csrf)).toEqual(['old', 'fresh'])
  })

  it('is not renewed for ever', async () => {
    const server = fakeServer({ 'POST /api/things': problem('forged-request') })
    await expect(request(schema, 'POST', '/api/things')).rejects.toMatchObject({ code: 'forged-request' })
    expect(server.seen).toHaveLength(2)
  })
})

describe('an ended session', () => {
  it('lets the same request go on once the person signed in again', async () => {
    signInAgain.mockResolvedValue(true)
    const server = fakeServer({ 'POST /api/things': [problem('not-signed-in'), json({ name: 'kept' }, 201)] })
    expect(await request(schema, 'POST', '/api/things', { body: { name: 'kept' } })).toEqual({ name: 'kept' })
    expect(server.seen.map((one) => one.body)).toEqual([{ name: 'kept' }, { name: 'kept' }])
  })

  it('gives the refusal to the caller where they declined', async () => {
    fakeServer({ 'POST /api/things': problem('not-signed-in') })
    await expect(request(schema, 'POST', '/api/things')).rejects.toMatchObject({ code: 'not-signed-in' })
  })

  it('asks nobody when the request itself was about signing in', async () => {
    fakeServer({ 'POST /api/session': problem('wrong-credentials') })
    await expect(request(schema, 'POST', '/api/session', { anonymous: true })).rejects.toMatchObject({
      code: 'wrong-credentials',
    })
    expect(signInAgain).not.toHaveBeenCalled()
  })
})
