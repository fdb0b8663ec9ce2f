import { QueryTypes, type Transaction } from 'sequelize'
import { mentionsIn } from '#shared/comments/plain.ts'
import type { Author } from '#shared/contract/activity.ts'
import {
  threadsPerPage,
  type Comment,
  type Mentionable,
  type Pin,
  type PinMark,
  type Thread,
  type ThreadList,
} from '#shared/contract/comments.ts'
import { toAuthor } from './activityService.ts'
import type { Context } from './context.ts'
import type { Reviewer } from './roundList.ts'

type Has = Pick<Context, 'database'>

interface ThreadRow {
  id: string
  number: number
  pin: Pin
  about: string
  revision: number
  gone_in: number | null
  resolved_at: Date | null
  user_id: string | null
  user_name: string | null
  guest_id: string | null
  guest_name: string | null
}

const selectThreads = `SELECT t.id, t.number, t.pin, t.about, t.revision, t.gone_in, t.resolved_at,
    t.resolved_user_id AS user_id, u.name AS user_name, t.resolved_guest_id AS guest_id, g.name AS guest_name
  FROM comment_threads t
  LEFT JOIN users u ON u.id = t.resolved_user_id LEFT JOIN guests g ON g.id = t.resolved_guest_id`

interface CommentRow {
  id: string
  thread_id: string
  at: Date
  edited_at: Date | null
  deleted_at: Date | null
  body: string
  user_id: string | null
  user_name: string | null
  guest_id: string | null
  guest_name: string | null
}

/** What a list of threads may be narrowed to. */
export interface ThreadQuery {
  state: 'open' | 'resolved' | 'all'
  of: 'all' | 'mine' | 'mentioning-me'
  page: number
}

const stateConditions = {
  open: 'AND t.resolved_at IS NULL',
  resolved: 'AND t.resolved_at IS NOT NULL',
  all: '',
} as const

/** Threads whose last word is youngest first, a page of them with all their comments. */
export async function listThreads(
  { database }: Has,
  buildId: string,
  reader: Reviewer,
  query: ThreadQuery,
): Promise<ThreadList> {
  const userId = 'guest' in reader ? null : reader.userId
  const guestId = 'guest' in reader ? reader.guest.id : null
  const of = {
    all: '($2::uuid IS NULL OR true) AND ($3::uuid IS NULL OR true)',
    mine: 'EXISTS (SELECT 1 FROM comments c WHERE c.thread_id = t.id AND (c.user_id = $2 OR c.guest_id = $3))',
    'mentioning-me': `$3::uuid IS NULL AND EXISTS (SELECT 1 FROM comments c
      JOIN comment_mentions m ON m.comment_id = c.id WHERE c.thread_id = t.id AND m.user_id = $2)`,
  }[query.of]
  const condition = `t.build_id = $1 ${stateConditions[query.state]} AND ${of}`
  const bind = [buildId, userId, guestId]
  const [rows, counts] = await Promise.all([
    database.query<ThreadRow>(`${selectThreads} WHERE ${condition} ORDER BY t.last_at DESC, t.id LIMIT $4 OFFSET $5`, {
      bind: [...bind, threadsPerPage, (query.page - 1) * threadsPerPage],
      type: QueryTypes.SELECT,
    }),
    database.query<{ total: string; open: string }>(
      `SELECT (SELECT count(*) FROM comment_threads t WHERE ${condition}) AS total,
         (SELECT count(*) FROM comment_threads t WHERE t.build_id = $1 AND t.resolved_at IS NULL) AS open`,
      { bind, type: QueryTypes.SELECT },
    ),
  ])
  return {
    items: await withComments({ database }, rows, reader),
    total: Number(counts[0]?.total ?? 0),
    page: query.page,
    open: Number(counts[0]?.open ?? 0),
  }
}

/** One thread of a build; null where there is none. */
export async function findThread(
  { database }: Has,
  buildId: string,
  threadId: string,
  reader: Reviewer,
  transaction?: Transaction,
): Promise<Thread | null> {
  const rows = await database.query<ThreadRow>(`${selectThreads} WHERE t.build_id = $1 AND t.id = $2`, {
    bind: [buildId, threadId],
    type: QueryTypes.SELECT,
    ...(transaction ? { transaction } : {}),
  })
  const [thread] = await withComments({ database }, rows, reader, transaction)
  return thread ?? null
}

/** What open threads are pinned to. */
export async function listPinMarks({ database }: Has, buildId: string): Promise<PinMark[]> {
  const rows = await database.query<{ id: string; number: number; pin: Pin; comments: string }>(
    `SELECT t.id, t.number, t.pin,
       (SELECT count(*) FROM comments c WHERE c.thread_id = t.id AND c.deleted_at IS NULL) AS comments
     FROM comment_threads t WHERE t.build_id = $1 AND t.resolved_at IS NULL
     ORDER BY t.last_at DESC, t.id LIMIT 2000`,
    { bind: [buildId], type: QueryTypes.SELECT },
  )
  return rows.map(({ id, number, pin, comments }) => ({ threadId: id, number, pin, comments: Number(comments) }))
}

/** People of a build, who may be mentioned in it. */
export async function listMentionable({ database }: Has, buildId: string): Promise<Mentionable[]> {
  return database.query<Mentionable>(
    `SELECT u.id AS "userId", u.name FROM build_members m JOIN users u ON u.id = m.user_id
     WHERE m.build_id = $1 ORDER BY u.name`,
    { bind: [buildId], type: QueryTypes.SELECT },
  )
}

async function withComments(
  { database }: Has,
  threads: readonly ThreadRow[],
  reader: Reviewer,
  transaction?: Transaction,
): Promise<Thread[]> {
  if (threads.length === 0) return []
  const rows = await database.query<CommentRow>(
    `SELECT c.id, c.thread_id, c.at, c.edited_at, c.deleted_at, c.body,
       c.user_id, u.name AS user_name, c.guest_id, g.name AS guest_name
     FROM comments c LEFT JOIN users u ON u.id = c.user_id LEFT JOIN guests g ON g.id = c.guest_id
     WHERE c.thread_id = ANY($1::uuid[]) ORDER BY c.at, c.id`,
    { bind: [threads.map(({ id }) => id)], type: QueryTypes.SELECT, ...(transaction ? { transaction } : {}) },
  )
  const names = await namesOf({ database }, rows, transaction)
  const byThread = new Map<string, CommentRow[]>()
  for (const row of rows) {
    const own = byThread.get(row.thread_id)
    if (own) own.push(row)
    else byThread.set(row.thread_id, [row])
  }
  return threads.map((thread) => ({
    id: thread.id,
    number: thread.number,
    pin: thread.pin,
    about: thread.about,
    revision: thread.revision,
    goneIn: thread.gone_in,
    resolved: thread.resolved_at && { by: toAuthor(thread), at: thread.resolved_at.toISOString() },
    comments: (byThread.get(thread.id) ?? []).map((row) => toComment(row, names, reader)),
  }))
}

async function namesOf(
  { database }: Has,
  comments: readonly CommentRow[],
  transaction?: Transaction,
): Promise<ReadonlyMap<string, string>> {
  const ids = [...new Set(comments.flatMap(({ body }) => mentionsIn(body)))]
  if (ids.length === 0) return new Map()
  const rows = await database.query<{ id: string; name: string }>(
    'SELECT id, name FROM users WHERE id = ANY($1::uuid[])',
    { bind: [ids], type: QueryTypes.SELECT, ...(transaction ? { transaction } : {}) },
  )
  return new Map(rows.map(({ id, name }) => [id, name]))
}

function toComment(row: CommentRow, names: ReadonlyMap<string, string>, reader: Reviewer): Comment {
  const by = toAuthor(row)
  const isDeleted = row.deleted_at !== null
  return {
    id: row.id,
    by,
    at: row.at.toISOString(),
    editedAt: row.edited_at?.toISOString() ?? null,
    isDeleted,
    text: isDeleted ? '' : row.body,
    mentions: isDeleted ? [] : mentionsIn(row.body).map((userId) => ({ userId, name: names.get(userId) ?? null })),
    isMine: isMine(by, reader),
  }
}

const isMine = (by: Author, reader: Reviewer): boolean =>
  'guest' in reader
    ? by.kind === 'guest' && by.guestId === reader.guest.id
    : by.kind === 'member' && by.userId === reader.userId
