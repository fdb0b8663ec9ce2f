import type { SaveRequest } from '#shared/contract/build.ts'
import { created, ok, type Answer, type Call } from '../middleware/call.ts'
import { listRevisions, readRevision, saveRevision } from '../services/revisionService.ts'
import { userOf } from './signedIn.ts'

export async function postRevision(call: Call<{ buildId: string }, unknown, SaveRequest>): Promise<Answer> {
  return created(await saveRevision(call.context, call.params.buildId, userOf(call).id, call.body))
}

export async function readRevisions({
  context,
  params,
  query,
}: Call<{ buildId: string }, { page: number }>): Promise<Answer> {
  return ok(await listRevisions(context, params.buildId, query.page))
}

export async function getRevision({ context, params }: Call<{ buildId: string; revision: number }>): Promise<Answer> {
  return ok(await readRevision(context, params.buildId, params.revision))
}
