import type { z } from 'zod'
import type { createBuildRequestSchema, importBuildRequestSchema } from '#shared/contract/build.ts'
import { created, ok, type Answer, type Call } from '../middleware/call.ts'
import { listBuilds, type BuildListQuery } from '../services/buildList.ts'
import {
  createBuild,
  duplicateBuild,
  importBuild,
  newestDocument,
  openBuild,
  openBuildAsGuest,
  setArchived,
} from '../services/buildService.ts'

import { exportName } from '../files/exportName.ts'
import { userOf } from './signedIn.ts'

type OfBuild = Call<{ buildId: string }>

export async function readBuilds(call: Call<unknown, BuildListQuery>): Promise<Answer> {
  return ok(await listBuilds(call.context.database, userOf(call).id, call.query))
}

export async function postBuild(
  call: Call<unknown, unknown, z.output<typeof createBuildRequestSchema>>,
): Promise<Answer> {
  return created(await createBuild(call.context, userOf(call).id, call.body))
}

export async function postImport(
  call: Call<unknown, unknown, z.output<typeof importBuildRequestSchema>>,
): Promise<Answer> {
  return created(await importBuild(call.context, userOf(call).id, call.body))
}

export async function readBuild(call: OfBuild): Promise<Answer> {
  const { context, guest, params } = call
  return ok(guest ? await openBuildAsGuest(context, guest) : await openBuild(context, params.buildId, userOf(call).id))
}

export async function exportBuild(call: OfBuild): Promise<Answer> {
  const { document } = await openBuild(call.context, call.params.buildId, userOf(call).id)
  return {
    status: 200,
    body: `${JSON.stringify(document, null, 2)}\n`,
    headers: { 'Content-Type': 'application/json; charset=utf-8', 'Content-Disposition': exportName(document.name) },
  }
}

export async function checkBuild(call: OfBuild): Promise<Answer> {
  const { context, params } = call
  const document = await newestDocument(context, params.buildId)
  return ok(await context.checks.check(document, await context.catalog.current()))
}

export async function postDuplicate(call: OfBuild): Promise<Answer> {
  return created(await duplicateBuild(call.context, userOf(call).id, call.params.buildId))
}

export async function archiveBuild(call: OfBuild): Promise<Answer> {
  return ok(await setArchived(call.context, userOf(call).id, call.params.buildId, true))
}

export async function restoreBuild(call: OfBuild): Promise<Answer> {
  return ok(await setArchived(call.context, userOf(call).id, call.params.buildId, false))
}
