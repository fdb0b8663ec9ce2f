import { QueryTypes, type Transaction } from 'sequelize'
import type { Activity } from '#shared/contract/activity.ts'
import type { MailKind } from '#shared/contract/mailChoices.ts'
import type { NoticeReason } from '#shared/contract/notifications.ts'
import { noticesChannel } from '../events/publish.ts'
import { newsMail } from '../mail/newsMails.ts'
import { activityByIds } from './activityService.ts'
import type { JobContext } from '../jobs/allJobs.ts'
import { mailFooter, timingsOf } from './mailChoiceService.ts'
import { queueMail } from './mailboxService.ts'
import { whoIsTold } from './whoIsTold.ts'

interface Person {
  id: string
  email: string
  name: string
}

type NewsKind = Exclude<MailKind, 'invitation' | 'digest'>

/** By which choice a person gets a mail of it; what has none is told in the app only. */
const mailKindOf: Readonly<Partial<Record<NoticeReason, NewsKind>>> = {
  mention: 'mention',
  reply: 'reply',
  comment: 'comment',
  'review-asked': 'review-asked',
  verdict: 'verdict',
  'approval-lapsed': 'verdict',
}

const why: Readonly<Record<NewsKind, string>> = {
  mention: 'You get this because somebody mentioned you.',
  reply: 'You get this because you wrote there before.',
  comment: 'You get this because you own the build.',
  'review-asked': 'You get this because you were asked for a review.',
  verdict: 'You get this because you asked for the review, gave a verdict in it, or own the build.',
}

/**
 * Tells people of a line of activity: a notification each, and the mails they want. Done in one transaction with taking
 * the job away, so that nobody is told twice. Nobody is told of their own act, nor who has left the build by now.
 */
export async function tellNews(context: JobContext, activityId: number, transaction: Transaction): Promise<void> {
  const [line] = await activityByIds(context, [activityId], transaction)
  if (!line) return
  const reasons = await whoIsTold(context.database, line, transaction)
  if (line.by.kind === 'member') reasons.delete(line.by.userId)
  const people = await stillThere(context, line.buildId, [...reasons.keys()], transaction)
  for (const person of people) {
    const reason = reasons.get(person.id)
    if (reason) await tell(context, line, person, reason, transaction)
  }
}

async function stillThere(
  { database }: JobContext,
  buildId: string,
  ids: readonly string[],
  transaction: Transaction,
): Promise<Person[]> {
  if (ids.length === 0) return []
  return database.query<Person>(
    `SELECT u.id, u.email, u.name FROM build_members m JOIN users u ON u.id = m.user_id
     WHERE m.build_id = $1 AND u.id::text = ANY($2) AND u.disabled_at IS NULL ORDER BY u.id`,
    { bind: [buildId, [...ids]], type: QueryTypes.SELECT, transaction },
  )
}

async function tell(
  context: JobContext,
  line: Activity,
  person: Person,
  reason: NoticeReason,
  transaction: Transaction,
): Promise<void> {
  const kind = mailKindOf[reason]
  const timing = kind ? (await timingsOf(context.database, kind, [person.email], transaction))(person.email) : 'digest'
  const made = await context.database.query(
    `INSERT INTO notifications (user_id, activity_id, build_id, reason, in_digest) VALUES ($1, $2, $3, $4, $5)
     ON CONFLICT DO NOTHING RETURNING user_id`,
    { bind: [person.id, line.id, line.buildId, reason, timing === 'digest'], type: QueryTypes.SELECT, transaction },
  )
  if (made.length === 0) return
  await context.database.query('SELECT pg_notify($1, $2)', { bind: [noticesChannel, person.id], transaction })
  if (!kind || timing !== 'at-once') return
  const { footer, token } = mailFooter(context, person.email, kind, why[kind])
  const buildName = await nameOf(context, line.buildId, transaction)
  const mail = newsMail({ to: person.name, buildName, line, reason, publicUrl: context.publicUrl, footer })
  await queueMail(
    context,
    {
      to: person.email,
      kind,
      mail,
      userId: person.id,
      buildId: line.buildId,
      activityId: line.id,
      unsubscribeToken: token,
    },
    transaction,
  )
}

async function nameOf({ database }: JobContext, buildId: string, transaction: Transaction): Promise<string> {
  const rows = await database.query<{ name: string }>('SELECT name FROM builds WHERE id = $1', {
    bind: [buildId],
    type: QueryTypes.SELECT,
    transaction,
  })
  return rows[0]?.name ?? ''
}
