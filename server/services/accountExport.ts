import { QueryTypes } from 'sequelize'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'

/** Columns that are keys to something, or no data of the person's. */
const secret = /hash|token|password|secret/
/** Tables that are told in a form of their own, or hold nothing but keys. */
const toldElsewhere = new Set(['build_revisions', 'build_members', 'messages', 'password_resets', 'refresh_tokens'])

/** Revisions that are read at a time. */
const batch = 200

/**
 * Everything of one person's as one JSON text, piece by piece: the account, the builds they are in (their own with every
 * revision, kept as edits from whole documents on), and each row of the database that names them. What has to be known
 * of new tables is read from the database itself, so that none is forgotten.
 */
export async function* exportAccount(context: Context, userId: string): AsyncGenerator<string> {
  const [account] = await rowsOf(context, 'users', 'id', userId)
  if (!account) throw new Refusal('not-found')
  yield `{"format":"bayloom-account","version":1,"exportedAt":${JSON.stringify(new Date().toISOString())}`
  yield `,"account":${JSON.stringify(account)},"builds":[`
  let first = true
  for await (const piece of exportBuilds(context, userId)) {
    yield `${first ? '' : ','}${piece.head}`
    first = false
    yield ',"revisions":['
    let comma = ''
    for await (const revision of piece.revisions) {
      yield comma + JSON.stringify(revision)
      comma = ','
    }
    yield ']}'
  }
  yield '],"records":{'
  let comma = ''
  for (const { table, column } of await tablesThatName(context)) {
    const rows = await rowsOf(context, table, column, userId)
    if (rows.length === 0) continue
    yield `${comma}${JSON.stringify(`${table} by ${column}`)}:${JSON.stringify(rows)}`
    comma = ','
  }
  yield '}}\n'
}

interface ExportedBuild {
  /** An object without its closing brace. */
  head: string
  revisions: AsyncGenerator<Record<string, unknown>>
}

async function* exportBuilds(context: Context, userId: string): AsyncGenerator<ExportedBuild> {
  const builds = await context.database.query<{ id: string; role: string; revision: number }>(
    `SELECT b.id, m.role, b.revision FROM build_members m JOIN builds b ON b.id = m.build_id
     WHERE m.user_id = $1 ORDER BY b.created_at, b.id`,
    { bind: [userId], type: QueryTypes.SELECT },
  )
  for (const { id, role, revision } of builds) {
    const [build] = await rowsOf(context, 'builds', 'id', id)
    const head = JSON.stringify({ ...build, role }).slice(0, -1)
    yield { head, revisions: exportRevisions(context, id, role === 'owner' ? 1 : revision) }
  }
}

/** Revisions of a build from one on: `document` where it is kept whole, else it comes of the edits since. */
async function* exportRevisions(
  context: Context,
  buildId: string,
  from: number,
): AsyncGenerator<Record<string, unknown>> {
  for (let after = from - 1; ;) {
    const rows = await context.database.query<Record<string, unknown> & { revision: number }>(
      `SELECT r.revision, r.saved_at AS "savedAt", u.name AS "savedBy", r.label, r.name, r.note, r.restored, r.hash,
         r.replay_from AS "replayFrom", r.document, r.edits
       FROM build_revisions r LEFT JOIN users u ON u.id = r.author_id
       WHERE r.build_id = $1 AND r.revision > $2 ORDER BY r.revision LIMIT ${batch}`,
      { bind: [buildId, after], type: QueryTypes.SELECT },
    )
    yield* rows
    const last = rows.at(-1)
    if (rows.length < batch || !last) return
    after = last.revision
  }
}

interface Naming {
  table: string
  column: string
}

/** Every column of the database that points at a person. */
async function tablesThatName(context: Context): Promise<Naming[]> {
  const rows = await context.database.query<Naming>(
    `SELECT c.conrelid::regclass::text AS "table", a.attname AS "column"
     FROM pg_constraint c JOIN pg_attribute a ON a.attrelid = c.conrelid AND a.attnum = c.conkey[1]
     WHERE c.contype = 'f' AND c.confrelid = 'users'::regclass ORDER BY 1, 2`,
    { type: QueryTypes.SELECT },
  )
  return rows.filter(({ table }) => !toldElsewhere.has(table))
}

/** Rows of a table that name somebody, without what is a key to something. Names come from the database, not from people. */
async function rowsOf(context: Context, table: string, column: string, id: string): Promise<Record<string, unknown>[]> {
  const rows = await context.database.query<Record<string, unknown>>(
    `SELECT * FROM ${table} WHERE ${column} = $1 LIMIT 100000`,
    { bind: [id], type: QueryTypes.SELECT },
  )
  return rows.map((row) =>
    Object.fromEntries(
      Object.entries(row).flatMap(([name, value]) =>
        secret.test(name) ? [] : [[name, Buffer.isBuffer(value) ? value.toString('base64') : value]],
      ),
    ),
  )
}
