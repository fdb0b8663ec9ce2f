import { randomUUID } from 'node:crypto'
import { QueryTypes, type Transaction } from 'sequelize'
import { aboutOf, heldBy } from '#shared/comments/about.ts'
import { excerptOf, mentionsIn } from '#shared/comments/plain.ts'
import type { Happening } from '#shared/contract/activity.ts'
import type { ReplyRequest, StartThreadRequest, Thread } from '#shared/contract/comments.ts'
import { publish, type Cause } from '../events/publish.ts'
import { Build } from '../models/index.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'
import { readDocument } from './revisionStore.ts'
import type { Reviewer } from './roundList.ts'
import { findThread } from './threadList.ts'

/** Who writes: a member or a guest; the policy of the route has let them through. */
export type Writer = Reviewer

const causeOf = (writer: Writer): Cause =>
  'guest' in writer ? { guestId: writer.guest.id } : { userId: writer.userId }

const columnsOf = (writer: Writer) =>
  'guest' in writer ? { userId: null, guestId: writer.guest.id } : { userId: writer.userId, guestId: null }

/** Starts a thread. A request repeated under the same id gives the thread that it made the first time. */
export async function startThread(
  context: Context,
  writer: Writer,
  buildId: string,
  { requestId, pin, about, text }: StartThreadRequest,
): Promise<Thread> {
  const thread = await context.database.transaction(async (transaction) => {
    const build = await holdBuild(buildId, transaction)
    const done = await findRepeated(context, writer, buildId, requestId, transaction)
    if (done) return done
    const { part, joint } = heldBy(pin)
    const document = await readDocument(context.database, buildId, build.revision, transaction)
    const own = aboutOf(pin, document)
    if (own === undefined && (part !== null || joint !== null))
      throw new Refusal('bad-input', {
        errors: [{ path: 'pin', message: 'is not in the newest revision of the build: somebody has removed it' }],
      })
    const threadId = randomUUID()
    const words = (own ?? about).slice(0, 200)
    await context.database.query(
      `INSERT INTO comment_threads (id, build_id, number, pin, part_id, joint_id, about, revision)
       SELECT $1::uuid, $2::uuid, coalesce(max(number), 0) + 1, $3::jsonb, $4::text, $5::text, $6::text, $7::integer
       FROM comment_threads WHERE build_id = $2::uuid`,
      { bind: [threadId, buildId, JSON.stringify(pin), part, joint, words, build.revision], transaction },
    )
    await addComment(context, writer, { buildId, threadId, requestId, text, about: words }, transaction)
    return reread(context, writer, buildId, threadId, transaction)
  })
  context.jobs.wake()
  return thread
}

/** Answers in a thread. */
export async function reply(
  context: Context,
  writer: Writer,
  buildId: string,
  threadId: string,
  { requestId, text }: ReplyRequest,
): Promise<Thread> {
  const thread = await context.database.transaction(async (transaction) => {
    const { about } = await holdThread(context, buildId, threadId, transaction)
    const done = await findRepeated(context, writer, buildId, requestId, transaction)
    if (done) return done
    await addComment(context, writer, { buildId, threadId, requestId, text, about }, transaction)
    await context.database.query('UPDATE comment_threads SET last_at = now() WHERE id = $1', {
      bind: [threadId],
      transaction,
    })
    return reread(context, writer, buildId, threadId, transaction)
  })
  context.jobs.wake()
  return thread
}

interface NewComment {
  buildId: string
  threadId: string
  requestId: string
  text: string
  about: string
}

async function addComment(
  context: Context,
  writer: Writer,
  { buildId, threadId, requestId, text, about }: NewComment,
  transaction: Transaction,
): Promise<void> {
  const commentId = randomUUID()
  const { userId, guestId } = columnsOf(writer)
  const before = await context.database.query<{ user_id: string }>(
    'SELECT DISTINCT user_id FROM comments WHERE thread_id = $1 AND user_id IS NOT NULL AND deleted_at IS NULL',
    { bind: [threadId], type: QueryTypes.SELECT, transaction },
  )
  await context.database.query(
    `INSERT INTO comments (id, thread_id, build_id, user_id, guest_id, body, request_id)
     VALUES ($1, $2, $3, $4, $5, $6, $7)`,
    { bind: [commentId, threadId, buildId, userId, guestId, text, requestId], transaction },
  )
  const mentioned = await setMentions(context, buildId, commentId, text, transaction)
  const what: Happening = {
    kind: 'comment-added',
    threadId,
    commentId,
    about,
    excerpt: excerptOf(text, (id) => mentioned.get(id)),
    mentions: [...mentioned.keys()].filter((id) => id !== userId),
    repliesTo: before.map(({ user_id }) => user_id).filter((id) => id !== userId),
  }
  await publish(context, buildId, causeOf(writer), what, transaction)
}

/** Writes down who is mentioned, as far as they belong to the build; answers them with their names. */
async function setMentions(
  context: Context,
  buildId: string,
  commentId: string,
  text: string,
  transaction: Transaction,
): Promise<ReadonlyMap<string, string>> {
  await context.database.query('DELETE FROM comment_mentions WHERE comment_id = $1', {
    bind: [commentId],
    transaction,
  })
  const ids = mentionsIn(text)
  if (ids.length === 0) return new Map()
  const people = await context.database.query<{ id: string; name: string }>(
    `WITH mentioned AS (
       INSERT INTO comment_mentions (comment_id, user_id)
       SELECT $1, m.user_id FROM build_members m WHERE m.build_id = $2 AND m.user_id::text = ANY($3::text[])
       RETURNING user_id
     ) SELECT u.id, u.name FROM mentioned JOIN users u ON u.id = mentioned.user_id`,
    { bind: [commentId, buildId, ids], type: QueryTypes.SELECT, transaction },
  )
  return new Map(people.map(({ id, name }) => [id, name]))
}

/** Writes one's own comment anew. Who is mentioned only now is told by nobody: a mention counts when it is first written. */
export async function editComment(
  context: Context,
  writer: Writer,
  buildId: string,
  commentId: string,
  text: string,
): Promise<Thread> {
  return context.database.transaction(async (transaction) => {
    const { threadId, body } = await holdOwn(context, writer, buildId, commentId, transaction)
    if (body !== text) {
      await context.database.query('UPDATE comments SET body = $2, edited_at = now() WHERE id = $1', {
        bind: [commentId, text],
        transaction,
      })
      await setMentions(context, buildId, commentId, text, transaction)
      await publish(context, buildId, causeOf(writer), { kind: 'comment-edited', threadId, commentId }, transaction)
    }
    return reread(context, writer, buildId, threadId, transaction)
  })
}

/**
 * Deletes one's own comment. A thread in which nobody else wrote goes with its last comment (null); else a stub stays,
 * so that the answers keep their sense.
 */
export async function deleteComment(
  context: Context,
  writer: Writer,
  buildId: string,
  commentId: string,
): Promise<Thread | null> {
  return context.database.transaction(async (transaction) => {
    const { threadId } = await holdOwn(context, writer, buildId, commentId, transaction)
    await context.database.query("UPDATE comments SET body = '', deleted_at = now() WHERE id = $1", {
      bind: [commentId],
      transaction,
    })
    await context.database.query('DELETE FROM comment_mentions WHERE comment_id = $1', {
      bind: [commentId],
      transaction,
    })
    const emptied = await context.database.query<{ id: string }>(
      `DELETE FROM comment_threads t WHERE t.id = $1
         AND NOT EXISTS (SELECT 1 FROM comments c WHERE c.thread_id = t.id AND c.deleted_at IS NULL)
       RETURNING t.id`,
      { bind: [threadId], type: QueryTypes.SELECT, transaction },
    )
    await publish(context, buildId, causeOf(writer), { kind: 'comment-deleted', threadId, commentId }, transaction)
    return emptied.length > 0 ? null : reread(context, writer, buildId, threadId, transaction)
  })
}

/** Resolves a thread or opens it again. Done already: nothing happens. */
export async function setResolved(
  context: Context,
  writer: Writer,
  buildId: string,
  threadId: string,
  resolved: boolean,
): Promise<Thread> {
  return context.database.transaction(async (transaction) => {
    const { about, isResolved } = await holdThread(context, buildId, threadId, transaction)
    if (isResolved !== resolved) {
      const { userId, guestId } = columnsOf(writer)
      await context.database.query(
        `UPDATE comment_threads SET resolved_at = CASE WHEN $2 THEN now() END,
           resolved_user_id = CASE WHEN $2 THEN $3::uuid END, resolved_guest_id = CASE WHEN $2 THEN $4::uuid END
         WHERE id = $1`,
        { bind: [threadId, resolved, userId, guestId], transaction },
      )
      const kind = resolved ? 'thread-resolved' : 'thread-reopened'
      await publish(context, buildId, causeOf(writer), { kind, threadId, about }, transaction)
    }
    return reread(context, writer, buildId, threadId, transaction)
  })
}

async function holdBuild(buildId: string, transaction: Transaction): Promise<Build> {
  const build = await Build.findByPk(buildId, { transaction, lock: transaction.LOCK.UPDATE })
  if (!build) throw new Refusal('not-found')
  return build
}

async function holdThread(
  context: Context,
  buildId: string,
  threadId: string,
  transaction: Transaction,
): Promise<{ about: string; isResolved: boolean }> {
  const rows = await context.database.query<{ about: string; resolved_at: Date | null }>(
    'SELECT about, resolved_at FROM comment_threads WHERE id = $1 AND build_id = $2 FOR UPDATE',
    { bind: [threadId, buildId], type: QueryTypes.SELECT, transaction },
  )
  if (!rows[0]) throw new Refusal('not-found')
  return { about: rows[0].about, isResolved: rows[0].resolved_at !== null }
}

async function holdOwn(
  context: Context,
  writer: Writer,
  buildId: string,
  commentId: string,
  transaction: Transaction,
): Promise<{ threadId: string; body: string }> {
  const rows = await context.database.query<{
    thread_id: string
    body: string
    user_id: string | null
    guest_id: string | null
  }>(
    `SELECT thread_id, body, user_id, guest_id FROM comments
     WHERE id = $1 AND build_id = $2 AND deleted_at IS NULL FOR UPDATE`,
    { bind: [commentId, buildId], type: QueryTypes.SELECT, transaction },
  )
  const [row] = rows
  if (!row) throw new Refusal('not-found')
  const { userId, guestId } = columnsOf(writer)
  const isOwn = userId === null ? row.guest_id === guestId : row.user_id === userId
  if (!isOwn) throw new Refusal('forbidden', { detail: 'Only whoever wrote a comment can change it.' })
  return { threadId: row.thread_id, body: row.body }
}

async function findRepeated(
  context: Context,
  writer: Writer,
  buildId: string,
  requestId: string,
  transaction: Transaction,
): Promise<Thread | null> {
  const rows = await context.database.query<{ thread_id: string }>(
    'SELECT thread_id FROM comments WHERE build_id = $1 AND request_id = $2',
    { bind: [buildId, requestId], type: QueryTypes.SELECT, transaction },
  )
  return rows[0] ? findThread(context, buildId, rows[0].thread_id, writer, transaction) : null
}

async function reread(
  context: Context,
  writer: Writer,
  buildId: string,
  threadId: string,
  transaction: Transaction,
): Promise<Thread> {
  const thread = await findThread(context, buildId, threadId, writer, transaction)
  if (!thread) throw new Refusal('not-found')
  return thread
}
