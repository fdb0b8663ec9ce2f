import type { z } from 'zod'
import type { putModelRequestSchema } from '#shared/contract/catalog.ts'
import { ok, type Answer, type Call } from '../middleware/call.ts'
import { listExamples } from '../services/exampleService.ts'
import { Refusal } from '../services/refusal.ts'
import { userOf } from './signedIn.ts'

/** The catalog with an ETag: a browser that has this version is told so and nothing more. */
export async function readCatalog({ context, request }: Call): Promise<Answer> {
  const { version, json } = await context.catalog.current()
  const headers = { ETag: `"${version}"`, 'Cache-Control': 'private, no-cache' }
  const known = (request.get('if-none-match') ?? '').split(',').map((tag) => tag.trim().replace(/^W\//, ''))
  if (known.includes(headers.ETag)) return { status: 304, headers }
  return { status: 200, body: json, headers: { ...headers, 'Content-Type': 'application/json; charset=utf-8' } }
}

export async function putCatalogModel(
  call: Call<{ modelId: string }, unknown, z.output<typeof putModelRequestSchema>>,
): Promise<Answer> {
  const { model, note } = call.body
  refuseOtherId(call.params.modelId, model.id)
  const put = await call.context.catalog.putModel(model, userOf(call).id, note ?? null)
  call.context.jobs.wake()
  return ok(put)
}

export async function readExamples({ context }: Call): Promise<Answer> {
  return ok(await listExamples(context))
}

/** The id in the address and the id in the model must be the same. */
export function refuseOtherId(addressed: string, given: string): void {
  if (addressed !== given)
    throw new Refusal('bad-input', { errors: [{ path: 'model.id', message: `the address says "${addressed}"` }] })
}
