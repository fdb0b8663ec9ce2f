import { QueryTypes, type Sequelize } from 'sequelize'
import type { Present } from '#shared/contract/live.ts'
import { activityAfter } from '../services/activityService.ts'
import type { Stream } from './stream.ts'

const page = 200
/** Who missed more than this is told to read everything anew instead of hearing it line by line. */
const mostMissed = 1_000

/**
 * Sends what a stream has missed, from the table. What happens meanwhile is not lost: whoever hears of it marks the
 * stream, and the table is read once more.
 */
export async function catchUp(database: Sequelize, stream: Stream): Promise<void> {
  if (stream.catchingUp) {
    stream.again = true
    return stream.catchingUp
  }
  stream.catchingUp = readOn(database, stream)
  await stream.catchingUp
}

async function readOn(database: Sequelize, stream: Stream): Promise<void> {
  try {
    const { buildId } = stream
    if (buildId === null) return
    for (let more = true; more || stream.again;) {
      stream.again = false
      const lines = await activityAfter({ database }, buildId, stream.lastId, page)
      for (const line of lines) {
        stream.lastId = line.id
        stream.send('activity', line, line.id)
      }
      more = lines.length === page
    }
  } finally {
    stream.catchingUp = null
  }
}

/** Says where a new stream stands, then sends what came after the line that its reader knew last. */
export async function greet(
  database: Sequelize,
  stream: Stream,
  after: number | null,
  present: () => Present[],
): Promise<void> {
  if (stream.buildId === null) {
    stream.send('hello', { lastId: 0, revision: null, present: [] })
    stream.catchingUp = null
    return
  }
  const rows = await database.query<{ revision: number; last: string; missed: string }>(
    `SELECT b.revision,
            (SELECT coalesce(max(a.id), 0) FROM activity a WHERE a.build_id = b.id) AS last,
            (SELECT count(*) FROM (
               SELECT 1 FROM activity a WHERE a.build_id = b.id AND a.id > $2 LIMIT $3) AS few) AS missed
     FROM builds b WHERE b.id = $1`,
    { bind: [stream.buildId, after ?? Number.MAX_SAFE_INTEGER, mostMissed + 1], type: QueryTypes.SELECT },
  )
  const standing = rows[0]
  if (after === null || Number(standing?.missed ?? 0) > mostMissed) stream.lastId = Number(standing?.last ?? 0)
  const hello = { lastId: stream.lastId, revision: standing?.revision ?? null, present: present() }
  stream.send('hello', hello, stream.lastId)
  await readOn(database, stream)
}
