import { QueryTypes, type Transaction } from 'sequelize'
import type { Activity, Author, Happening } from '#shared/contract/activity.ts'
import type { ActivityPage } from '#shared/contract/live.ts'
import type { Context } from './context.ts'

/** Lines of activity on one page. */
const pageSize = 100

/** Columns of `activityFrom`, read by `toActivity`. */
export const activityColumns = `a.id AS activity_id, a.build_id, a.at, a.kind, a.details,
  a.user_id, u.name AS user_name, a.guest_id, g.name AS guest_name`
export const activityFrom = `activity a LEFT JOIN users u ON u.id = a.user_id LEFT JOIN guests g ON g.id = a.guest_id`

/** A row of `activityColumns`. */
export interface ActivityRow {
  activity_id: string
  build_id: string
  at: Date
  kind: string
  details: object
  user_id: string | null
  user_name: string | null
  guest_id: string | null
  guest_name: string | null
}

export const toActivity = (row: ActivityRow): Activity => ({
  id: Number(row.activity_id),
  buildId: row.build_id,
  at: row.at.toISOString(),
  by: toAuthor(row),
  what: { kind: row.kind, ...row.details } as Happening,
})

/** Who did it, from the columns of the two kinds of people. */
export function toAuthor(row: Pick<ActivityRow, 'user_id' | 'user_name' | 'guest_id' | 'guest_name'>): Author {
  if (row.user_id !== null && row.user_name !== null)
    return { kind: 'member', userId: row.user_id, name: row.user_name }
  if (row.guest_id !== null && row.guest_name !== null)
    return { kind: 'guest', guestId: row.guest_id, name: row.guest_name }
  return { kind: 'former' }
}

/** Who did what in a build, newest first. */
export async function listActivity(
  context: Pick<Context, 'database'>,
  buildId: string,
  before: number | undefined,
): Promise<ActivityPage> {
  const rows = await context.database.query<ActivityRow>(
    `SELECT ${activityColumns} FROM ${activityFrom}
     WHERE a.build_id = $1 AND ($2::bigint IS NULL OR a.id < $2::bigint) ORDER BY a.id DESC LIMIT $3`,
    { bind: [buildId, before ?? null, pageSize + 1], type: QueryTypes.SELECT },
  )
  return { items: rows.slice(0, pageSize).map(toActivity), more: rows.length > pageSize }
}

/** Lines of a build after a number, in the order in which they happened. */
export async function activityAfter(
  context: Pick<Context, 'database'>,
  buildId: string,
  after: number,
  most: number,
): Promise<Activity[]> {
  const rows = await context.database.query<ActivityRow>(
    `SELECT ${activityColumns} FROM ${activityFrom} WHERE a.build_id = $1 AND a.id > $2 ORDER BY a.id LIMIT $3`,
    { bind: [buildId, after, most], type: QueryTypes.SELECT },
  )
  return rows.map(toActivity)
}

/** Lines by their numbers. */
export async function activityByIds(
  context: Pick<Context, 'database'>,
  ids: readonly number[],
  transaction?: Transaction,
): Promise<Activity[]> {
  const rows = await context.database.query<ActivityRow>(
    `SELECT ${activityColumns} FROM ${activityFrom} WHERE a.id = ANY($1::bigint[]) ORDER BY a.id`,
    { bind: [[...ids]], type: QueryTypes.SELECT, ...(transaction ? { transaction } : {}) },
  )
  return rows.map(toActivity)
}
