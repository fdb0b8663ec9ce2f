import { afterAll, beforeAll, expect, test } from 'vitest'
import { routes } from '../../server/routes/index.ts'
import { startApi, type Api } from './support/api.ts'

interface Operation {
  parameters?: { name: string; in: string; required?: boolean }[]
  requestBody?: unknown
  responses: Record<string, { content?: Record<string, { schema: unknown }> }>
}

let api: Api
let description: {
  openapi: string
  paths: Record<string, Record<string, Operation>>
  components?: { schemas?: object }
}
beforeAll(async () => {
  api = await startApi()
  description = (await (await api.visitor()).get('/api/openapi.json')).body as typeof description
})
afterAll(() => api.close())

test('is OpenAPI 3.1', () => {
  expect(description.openapi).toMatch(/^3\.1\./)
})

test.each(routes.map((route) => [`${route.method} ${route.path}`, route] as const))('describes %s', (_name, route) => {
  const operation = description.paths[route.path.replace(/:(\w+)/g, '{$1}')]?.[route.method]
  expect(operation).toBeDefined()
  const inPath = operation?.parameters?.filter((parameter) => parameter.in === 'path').map(({ name }) => name) ?? []
  expect(inPath.sort()).toEqual([...route.path.matchAll(/:(\w+)/g)].map((match) => match[1]).sort())
  expect(operation?.requestBody !== undefined).toBe(route.body !== undefined || route.takesPhoto === true)
  expect(Object.keys(operation?.responses ?? {})).toEqual([...Object.keys(route.answers), 'default'])
  for (const [status, schema] of Object.entries(route.answers))
    expect(operation?.responses[status]?.content !== undefined).toBe(schema !== null)
})

test('describes nothing that is not there', () => {
  const described = Object.entries(description.paths).flatMap(([path, methods]) =>
    Object.keys(methods).map((method) => `${method} ${path.replace(/\{(\w+)\}/g, ':$1')}`),
  )
  expect(described.sort()).toEqual(routes.map((route) => `${route.method} ${route.path}`).sort())
})

test('every reference in it leads somewhere', () => {
  const schemas = new Set(Object.keys(description.components?.schemas ?? {}))
  const references = [...JSON.stringify(description).matchAll(/"\$ref":"#\/components\/schemas\/([^"]+)"/g)]
  for (const [, name] of references) expect(schemas).toContain(name)
})
