import { QueryTypes } from 'sequelize'
import type { Notice, NoticePage, NoticeReason, ReadNotices } from '#shared/contract/notifications.ts'
import { noticesChannel } from '../events/publish.ts'
import { activityColumns, activityFrom, toActivity, type ActivityRow } from './activityService.ts'
import type { Context } from './context.ts'

const pageSize = 30

/** A person is told only of builds that they still belong to. */
const stillIn = 'JOIN build_members m ON m.build_id = n.build_id AND m.user_id = n.user_id'

type NoticeRow = ActivityRow & { reason: NoticeReason; read: boolean; build_name: string }

const toNotice = (row: NoticeRow): Notice => ({
  id: Number(row.activity_id),
  buildName: row.build_name,
  reason: row.reason,
  read: row.read,
  activity: toActivity(row),
})

/** What a person was told of, newest first. */
export async function listNotices(
  context: Pick<Context, 'database'>,
  userId: string,
  before: number | undefined,
): Promise<NoticePage> {
  const rows = await context.database.query<NoticeRow>(
    `SELECT ${activityColumns}, n.reason, n.read_at IS NOT NULL AS read, b.name AS build_name
     FROM ${activityFrom} JOIN notifications n ON n.activity_id = a.id ${stillIn}
     JOIN builds b ON b.id = n.build_id
     WHERE n.user_id = $1 AND ($2::bigint IS NULL OR n.activity_id < $2::bigint)
     ORDER BY n.activity_id DESC LIMIT $3`,
    { bind: [userId, before ?? null, pageSize + 1], type: QueryTypes.SELECT },
  )
  return {
    items: rows.slice(0, pageSize).map(toNotice),
    more: rows.length > pageSize,
    unread: await countUnread(context, userId),
  }
}

export async function countUnread(context: Pick<Context, 'database'>, userId: string): Promise<number> {
  const rows = await context.database.query<{ unread: string }>(
    `SELECT count(*) AS unread FROM notifications n ${stillIn} WHERE n.user_id = $1 AND n.read_at IS NULL`,
    { bind: [userId], type: QueryTypes.SELECT },
  )
  return Number(rows[0]?.unread ?? 0)
}

/** Marks one, or all up to the newest one that was seen; every tab of the person hears of it. */
export async function readNotices(
  context: Pick<Context, 'database'>,
  userId: string,
  which: ReadNotices,
): Promise<{ unread: number }> {
  const [least, most] = 'id' in which ? [which.id, which.id] : [0, which.upTo]
  await context.database.transaction(async (transaction) => {
    await context.database.query(
      `UPDATE notifications SET read_at = now()
       WHERE user_id = $1 AND activity_id BETWEEN $2 AND $3 AND read_at IS NULL`,
      { bind: [userId, least, most], transaction },
    )
    await context.database.query('SELECT pg_notify($1, $2)', { bind: [noticesChannel, userId], transaction })
  })
  return { unread: await countUnread(context, userId) }
}
