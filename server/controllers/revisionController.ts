import type { SaveRequest } from '#shared/contract/build.ts'
import type {
  ComparisonQuery,
  DescribeRevisionRequest,
  ListRevisionsQuery,
  RestoreRevisionRequest,
} from '#shared/contract/revisions.ts'
import { created, ok, type Answer, type Call } from '../middleware/call.ts'
import { restoreRevision } from '../services/restoreService.ts'
import { describeRevision, listRevisions, readRevision } from '../services/revisionList.ts'
import { saveRevision } from '../services/revisionService.ts'
import { userOf } from './signedIn.ts'

type OfBuild = { buildId: string }
type OfRevision = { buildId: string; revision: number }

export async function postRevision(call: Call<OfBuild, unknown, SaveRequest>): Promise<Answer> {
  return created(await saveRevision(call.context, call.params.buildId, userOf(call).id, call.body))
}

export async function readRevisions({ context, params, query }: Call<OfBuild, ListRevisionsQuery>): Promise<Answer> {
  return ok(await listRevisions(context, params.buildId, query))
}

export async function getRevision({ context, params }: Call<OfRevision>): Promise<Answer> {
  return ok(await readRevision(context, params.buildId, params.revision))
}

export async function patchRevision(call: Call<OfRevision, unknown, DescribeRevisionRequest>): Promise<Answer> {
  return ok(await describeRevision(call.context, userOf(call).id, call.params, call.body))
}

export async function postRestore(call: Call<OfRevision, unknown, RestoreRevisionRequest>): Promise<Answer> {
  return created(await restoreRevision(call.context, userOf(call).id, call.params, call.body))
}

export async function getComparison({ context, params, query }: Call<OfBuild, ComparisonQuery>): Promise<Answer> {
  return ok(await context.comparisons.compare(context, params.buildId, query))
}
