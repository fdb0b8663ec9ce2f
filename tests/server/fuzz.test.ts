import { randomUUID } from 'node:crypto'
import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { openBuildSchema } from '#shared/contract/build.ts'
import { problemSchema } from '#shared/contract/problems.ts'
import { routes } from '../../server/routes/index.ts'
import type { AnyRoute } from '../../server/routes/route.ts'
import { startApi, type Api, type Client } from './support/api.ts'
import { addCable, cablesDocument, edit, note, save } from './support/documents.ts'

let api: Api
let person: Client
let buildId: string
beforeAll(async () => {
  api = await startApi({ settings: { RATE_LIMIT_FACTOR: '1000' } })
  person = await api.person({ role: 'administrator' })
  const made = await person.post('/api/builds/import', { document: cablesDocument('Fuzzed', 3) })
  buildId = openBuildSchema.parse(made.body).id
})
afterAll(() => api.close())

/** Names that mean something to JavaScript, the database or our own documents, among any others. */
const names = fc.oneof(
  fc.constantFrom('__proto__', 'constructor', 'toString', 'document', 'name', 'parts', 'edits', 'base', 'model', 'id'),
  fc.string({ unit: 'binary', maxLength: 12 }),
)
const leaf = fc.oneof(
  fc.string({ unit: 'binary', maxLength: 40 }),
  fc.constantFrom('\u0000', "'; DROP TABLE users; --", '<script>alert(1)</script>', '\ud800', '$1', '%s', '../..'),
  fc.double(),
  fc.maxSafeInteger(),
  fc.boolean(),
  fc.constant(null),
)
const wild: fc.Arbitrary<unknown> = fc.letrec((tie) => ({
  node: fc.oneof(
    { depthSize: 'small', withCrossShrink: true },
    leaf,
    fc.array(tie('node'), { maxLength: 4 }),
    fc.dictionary(names, tie('node'), { maxKeys: 5 }),
  ),
})).node

/** A wild value in one place of an otherwise sound body, so that it gets past the first check. */
const spoiled = (sound: object): fc.Arbitrary<unknown> => {
  const places = placesIn(sound)
  return fc.tuple(fc.constantFrom(...places), wild).map(([place, value]) => setAt(sound, place, value))
}

function placesIn(value: unknown, path: string[] = []): string[][] {
  if (typeof value !== 'object' || value === null) return [path]
  const inner = Object.entries(value).flatMap(([key, item]) => placesIn(item, [...path, key]))
  return path.length > 0 ? [path, ...inner] : inner
}

function setAt(value: unknown, [key, ...rest]: readonly string[], to: unknown): unknown {
  if (key === undefined) return to
  const copy = (Array.isArray(value) ? [...value] : { ...(value as object) }) as Record<string, unknown>
  copy[key] = setAt(copy[key], rest, to)
  return copy
}

/** Every answer is below 500; a refusal is problem details. */
function holds(response: { status: number; body: unknown; text: string }): void {
  expect(response.status, response.text).toBeLessThan(500)
  if (response.status >= 400) problemSchema.parse(response.body)
}

const bodyRoutes = routes.filter((route) => route.body !== undefined)
const addressOf = (route: AnyRoute) =>
  route.path
    .replace(':buildId', buildId)
    .replace(':userId', person.user?.id ?? '')
    .replace(':token', 'a'.repeat(43))
    .replace(':modelId', 'fuzzed-model')

describe('no body makes the server stumble', () => {
  test.each(bodyRoutes.map((route) => [`${route.method} ${route.path}`, route] as const))(
    '%s',
    async (_name, route) => {
      await fc.assert(
        fc.asyncProperty(wild, async (body) => {
          holds(await person.send(route.method, addressOf(route), JSON.stringify(body) ?? 'null', json))
        }),
        { numRuns: 25 },
      )
    },
  )

  test('a document with one wild place', async () => {
    const document = {
      ...cablesDocument('Spoiled', 2),
      settings: { derating: 0.8, spinUp: { mode: 'staged', interval_s: 3 } },
      joints: [{ id: 'j1', a: { part: 'p1', connector: 'a' }, b: { part: 'p2', connector: 'b' } }],
    }
    await fc.assert(
      fc.asyncProperty(spoiled({ document, name: 'Spoiled' }), async (body) => {
        holds(await person.send('post', '/api/builds/import', JSON.stringify(body), json))
      }),
      { numRuns: 100 },
    )
  })

  test('edits with one wild place', async () => {
    const sound = save(1, edit('Fine', addCable(20), note('p1', 'x')), {
      label: 'More',
      changes: [
        { op: 'addJoint', joint: { id: 'j1', a: { part: 'p1', connector: 'a' }, b: { part: 'p2', connector: 'a' } } },
        { op: 'removeJoint', id: 'j1' },
        { op: 'rename', name: 'Renamed', machine: null },
      ],
    })
    await fc.assert(
      fc.asyncProperty(spoiled(sound), async (body) => {
        const fresh = { ...(body as object), requestId: randomUUID() }
        holds(await person.send('post', `/api/builds/${buildId}/revisions`, JSON.stringify(fresh), json))
      }),
      { numRuns: 100 },
    )
  })
})

const json = { 'content-type': 'application/json' }

test('no address and no query makes the server stumble', async () => {
  const getRoutes = routes.filter((route) => route.method === 'get')
  const text = fc.string({ unit: 'binary', maxLength: 30 }).map((value) => value.replace(/\p{Surrogate}/gu, ''))
  await fc.assert(
    fc.asyncProperty(fc.constantFrom(...getRoutes), text, names, text, async (route, id, name, value) => {
      const path = route.path.replace(/:\w+/g, () => encodeURIComponent(id) || 'x')
      const key = encodeURIComponent(name.replace(/\p{Surrogate}/gu, ''))
      holds(await person.get(`${path}?${key}=${encodeURIComponent(value)}&search=${encodeURIComponent(value)}`))
    }),
    { numRuns: 100 },
  )
})

test('an id that is unknown leads nowhere, on every route', async () => {
  for (const route of routes.filter((candidate) => candidate.path.includes(':'))) {
    const path = route.path
      .replace(':token', 'b'.repeat(43))
      .replace(':modelId', 'unknown')
      .replace(/:\w+/g, randomUUID())
    const response = await person.send(route.method, path, route.body ? {} : undefined)
    expect([400, 404, 410], `${route.method} ${path}: ${response.text}`).toContain(response.status)
  }
})
