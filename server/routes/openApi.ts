import { z } from 'zod'
import { createDocument } from 'zod-openapi'
import { problemSchema } from '#shared/contract/problems.ts'
import { ok } from '../middleware/call.ts'
import { policies } from '../policies/policy.ts'
import { defineRoute, type AnyRoute } from './route.ts'

/** The API described from the very schemas that read its requests (OpenAPI 3.1). */
export function describeApi(routes: readonly AnyRoute[]) {
  const paths: Record<string, Record<string, unknown>> = {}
  for (const route of routes) {
    const path = route.path.replace(/:(\w+)/g, '{$1}')
    paths[path] = { ...paths[path], [route.method]: operation(route) }
  }
  return createDocument({
    openapi: '3.1.0',
    info: {
      title: 'Bayloom',
      version: '1',
      description:
        'Sessions are cookies. Every request that changes something carries the session’s `csrfToken` in `x-csrf-token`.',
    },
    paths: paths as Parameters<typeof createDocument>[0]['paths'],
  })
}

function operation(route: AnyRoute) {
  return {
    summary: route.summary,
    description: `For ${policies[route.policy]}.`,
    requestParams: {
      ...(route.params ? { path: route.params } : {}),
      ...(route.query ? { query: route.query } : {}),
    },
    ...(route.takesPhoto ? { requestBody: { required: true, content: { 'image/*': {} } } } : {}),
    ...(route.body ? { requestBody: { required: true, content: { 'application/json': { schema: route.body } } } } : {}),
    responses: {
      ...Object.fromEntries(Object.entries(route.answers).map(([status, schema]) => [status, answer(schema, route)])),
      default: { description: 'Refused', content: { 'application/problem+json': { schema: problemSchema } } },
    },
  }
}

const answer = (schema: z.ZodType | null, { streams = false }: AnyRoute) => ({
  description: schema ? 'Done' : 'Done, with no body',
  ...(schema ? { content: { [streams ? 'text/event-stream' : 'application/json']: { schema } } } : {}),
})

/** GET /api/openapi.json, which describes itself too. */
export function openApiRoute(others: readonly AnyRoute[]): AnyRoute {
  let made: string | undefined
  const route: AnyRoute = defineRoute({
    method: 'get',
    path: '/api/openapi.json',
    policy: 'anybody',
    summary: 'This description',
    answers: { 200: z.record(z.string(), z.unknown()) },
    controller: () => {
      made ??= JSON.stringify(describeApi([...others, route]))
      return { ...ok(made), headers: { 'Content-Type': 'application/json; charset=utf-8' } }
    },
  })
  return route
}
