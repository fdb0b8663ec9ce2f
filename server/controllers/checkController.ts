import { readBuild } from '#shared/build/read.ts'
import { ok, type Answer, type Call } from '../middleware/call.ts'
import { Refusal } from '../services/refusal.ts'

/** Checks a document that is not saved anywhere. */
export async function postCheck({ context, body }: Call): Promise<Answer> {
  const catalog = await context.catalog.current()
  const read = readBuild(body, catalog.index)
  if (!read.ok) throw new Refusal('unreadable-document', { errors: read.problems })
  return ok(await context.checks.check(read.document, catalog))
}
