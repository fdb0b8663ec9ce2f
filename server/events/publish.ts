import { QueryTypes, type Transaction } from 'sequelize'
import type { Happening } from '#shared/contract/activity.ts'
import { enqueue } from '../jobs/queue.ts'
import { isNews } from '../services/whoIsTold.ts'
import type { Context } from '../services/context.ts'

/** Who caused it: a person with an account, or a guest of a link. */
export type Cause = { userId: string } | { guestId: string }

/** The channel on which every process hears of new activity: the row's id, with "news" behind it where a job waits. */
export const activityChannel = 'bayloom_activity'
export const activityWord = (id: number, isNewsToo: boolean): string => (isNewsToo ? `${id} news` : String(id))
export const readActivityWord = (word: string): { id: number; isNews: boolean } => ({
  id: Number(word.split(' ')[0]),
  isNews: word.endsWith(' news'),
})
/** Says whose notifications changed: the person's id. */
export const noticesChannel = 'bayloom_notices'
/** Who has which build open, said from process to process. */
export const presenceChannel = 'bayloom_presence'
/** Who may have lost access: "session:…" or "build:…", said by triggers of the database. */
export const accessChannel = 'bayloom_access'

/**
 * Writes one line of a build's activity in the transaction of its cause. Once that is committed, every process tells the
 * browsers that have the build open, and mails and notifications follow from the row; without it, nothing happens.
 * Rows of one build are written one transaction after the other, so that their numbers follow the order of the
 * commits and a reader who asks for "all after number n" misses none: call this last.
 */
export async function publish(
  context: Pick<Context, 'database'>,
  buildId: string,
  cause: Cause,
  what: Happening,
  transaction: Transaction,
): Promise<number> {
  const { kind, ...details } = what
  await context.database.query('SELECT pg_advisory_xact_lock(hashtextextended($1, 0))', {
    bind: [`activity ${buildId}`],
    transaction,
  })
  const rows = await context.database.query<{ id: string }>(
    `INSERT INTO activity (build_id, user_id, guest_id, kind, details) VALUES ($1, $2, $3, $4, $5) RETURNING id`,
    {
      bind: [
        buildId,
        'userId' in cause ? cause.userId : null,
        'guestId' in cause ? cause.guestId : null,
        kind,
        JSON.stringify(details),
      ],
      type: QueryTypes.SELECT,
      transaction,
    },
  )
  const id = Number(rows[0]?.id)
  if (isNews(kind)) await enqueue(context.database, 'news', { activityId: id }, transaction)
  const word = activityWord(id, isNews(kind))
  await context.database.query('SELECT pg_notify($1, $2)', { bind: [activityChannel, word], transaction })
  return id
}
