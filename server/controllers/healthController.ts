import { ok, type Answer, type Call } from '../middleware/call.ts'

/** Says that the server and its database answer. */
export async function readHealth({ context }: Call): Promise<Answer> {
  await context.database.query('SELECT 1')
  return ok({ ok: true })
}
