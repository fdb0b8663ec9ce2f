import type { FindDrivesQuery } from '#shared/contract/drives.ts'
import { ok, type Answer, type Call } from '../middleware/call.ts'
import { findDrives } from '../services/driveIndex.ts'
import { userOf } from './signedIn.ts'

export async function readDrives(call: Call<unknown, FindDrivesQuery>): Promise<Answer> {
  return ok(await findDrives(call.context, userOf(call).id, call.query.search))
}
