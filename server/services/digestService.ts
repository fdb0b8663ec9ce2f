import { QueryTypes, type Transaction } from 'sequelize'
import type { Activity } from '#shared/contract/activity.ts'
import type { MailTiming } from '#shared/contract/mailChoices.ts'
import type { Job } from '../jobs/jobLoop.ts'
import { digestMail, type DigestPart } from '../mail/newsMails.ts'
import { activityColumns, activityFrom, toActivity, type ActivityRow } from './activityService.ts'
import type { JobContext } from '../jobs/allJobs.ts'
import { nextDigest } from './digestTimes.ts'
import { mailFooter, timingsOf } from './mailChoiceService.ts'
import { queueMail } from './mailboxService.ts'

const hour_ms = 3_600_000
/** Lines of one build that are read for a digest at most; the mail shows fewer. */
const mostRead = 300

interface Due {
  user_id: string
  email: string
  name: string
  covered_to: string
}
type NamedRow = ActivityRow & { build_name: string }

/** Sends each person's digest when it is due, one person at a time, in the transaction that notes what it covers. */
export function sendDigests(context: JobContext): Job {
  let enrolled = 0
  return async () => {
    if (Date.now() - enrolled >= hour_ms) {
      await enrol(context)
      enrolled = Date.now()
    }
    return context.database.transaction(async (transaction) => {
      const due = await takeDue(context, transaction)
      if (!due) return false
      const timing = (await timingsOf(context.database, 'digest', [due.email], transaction))(due.email)
      const upTo = await newestSettled(context, transaction)
      if (timing === 'daily' || timing === 'weekly') await send(context, due, timing, upTo, transaction)
      await context.database.query(
        'UPDATE digests SET covered_to = greatest(covered_to, $2), next_at = $3 WHERE user_id = $1',
        {
          bind: [due.user_id, upTo, nextDigest(timing, new Date())],
          transaction,
        },
      )
      return true
    })
  }
}

/** A new person's first digest covers what happens from now on. */
async function enrol({ database }: JobContext): Promise<void> {
  await database.query(
    `INSERT INTO digests (user_id, covered_to, next_at)
     SELECT u.id, (SELECT coalesce(max(id), 0) FROM activity), $1 FROM users u
     WHERE NOT EXISTS (SELECT 1 FROM digests d WHERE d.user_id = u.id) ON CONFLICT DO NOTHING`,
    { bind: [nextDigest('weekly', new Date())] },
  )
}

async function takeDue({ database }: JobContext, transaction: Transaction): Promise<Due | undefined> {
  const rows = await database.query<Due>(
    `SELECT d.user_id, d.covered_to, u.email, u.name FROM digests d JOIN users u ON u.id = d.user_id
     WHERE d.next_at <= now() AND u.disabled_at IS NULL ORDER BY d.next_at LIMIT 1 FOR UPDATE OF d SKIP LOCKED`,
    { type: QueryTypes.SELECT, transaction },
  )
  return rows[0]
}

/** Up to here all is committed: lines of the last minute may still have an older one on its way beside them. */
async function newestSettled({ database }: JobContext, transaction: Transaction): Promise<number> {
  const rows = await database.query<{ id: string }>(
    `SELECT coalesce(max(id), 0) AS id FROM activity WHERE at < now() - interval '1 minute'`,
    { type: QueryTypes.SELECT, transaction },
  )
  return Number(rows[0]?.id ?? 0)
}

async function send(
  context: JobContext,
  due: Due,
  rhythm: Extract<MailTiming, 'daily' | 'weekly'>,
  upTo: number,
  transaction: Transaction,
): Promise<void> {
  const builds = await readBuilds(context, due, upTo, transaction)
  const personal = await readPersonal(context, due, transaction)
  if (builds.length === 0 && personal.length === 0) return
  const { footer, token } = mailFooter(context, due.email, 'digest', 'You get this because you belong to these builds.')
  const mail = digestMail({ to: due.name, rhythm, personal, builds, publicUrl: context.publicUrl, footer })
  await queueMail(
    context,
    { to: due.email, kind: 'digest', mail, userId: due.user_id, unsubscribeToken: token },
    transaction,
  )
}

/** What others did in the person's builds, build by build, newest first. */
async function readBuilds(
  { database }: JobContext,
  due: Due,
  upTo: number,
  transaction: Transaction,
): Promise<DigestPart[]> {
  const rows = await database.query<NamedRow>(
    `SELECT ${activityColumns}, b.name AS build_name FROM build_members m JOIN builds b ON b.id = m.build_id
     CROSS JOIN LATERAL (
       SELECT * FROM activity one WHERE one.build_id = m.build_id AND one.id > $2 AND one.id <= $3
         AND one.user_id IS DISTINCT FROM m.user_id ORDER BY one.id DESC LIMIT $4) a
     LEFT JOIN users u ON u.id = a.user_id LEFT JOIN guests g ON g.id = a.guest_id
     WHERE m.user_id = $1 AND NOT m.archived ORDER BY b.name, b.id, a.id DESC`,
    { bind: [due.user_id, due.covered_to, upTo, mostRead], type: QueryTypes.SELECT, transaction },
  )
  const parts = new Map<string, { buildId: string; buildName: string; lines: Activity[] }>()
  for (const row of rows) {
    const part = parts.get(row.build_id) ?? { buildId: row.build_id, buildName: row.build_name, lines: [] }
    part.lines.push(toActivity(row))
    parts.set(row.build_id, part)
  }
  return [...parts.values()]
}

/** What the person wanted in the digest and has not read in the app meanwhile. It is in one digest only. */
async function readPersonal(
  { database }: JobContext,
  due: Due,
  transaction: Transaction,
): Promise<{ buildName: string; line: Activity }[]> {
  const rows = await database.query<NamedRow>(
    `SELECT ${activityColumns}, b.name AS build_name FROM ${activityFrom}
     JOIN notifications n ON n.activity_id = a.id JOIN builds b ON b.id = n.build_id
     JOIN build_members m ON m.build_id = n.build_id AND m.user_id = n.user_id
     WHERE n.user_id = $1 AND n.in_digest AND n.read_at IS NULL AND n.reason <> 'people' ORDER BY a.id DESC`,
    { bind: [due.user_id], type: QueryTypes.SELECT, transaction },
  )
  await database.query('UPDATE notifications SET in_digest = false WHERE user_id = $1 AND in_digest', {
    bind: [due.user_id],
    transaction,
  })
  return rows.map((row) => ({ buildName: row.build_name, line: toActivity(row) }))
}
