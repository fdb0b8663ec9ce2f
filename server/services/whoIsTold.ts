import { QueryTypes, type Sequelize, type Transaction } from 'sequelize'
import type { Activity, HappeningKind } from '#shared/contract/activity.ts'
import type { NoticeReason } from '#shared/contract/notifications.ts'

/** What people are told of. Everything else is in the activity and the digest. */
const news: ReadonlySet<HappeningKind> = new Set([
  'comment-added',
  'round-asked',
  'verdict-given',
  'round-closed',
  'approval-lapsed',
  'member-joined',
  'member-left',
  'role-changed',
  'ownership-transferred',
  'guest-joined',
])
export const isNews = (kind: HappeningKind): boolean => news.has(kind)

type Told = Map<string, NoticeReason>

/** Whom a line of activity concerns, and why; the strongest reason counts. Whoever caused it may be among them. */
export async function whoIsTold(database: Sequelize, line: Activity, transaction: Transaction): Promise<Told> {
  const { what, buildId } = line
  const told: Told = new Map()
  const add = (reason: NoticeReason, ids: readonly string[]) => {
    for (const id of ids) if (!told.has(id)) told.set(id, reason)
  }
  const owners = () =>
    ids(database, `SELECT user_id FROM build_members WHERE build_id = $1 AND role = 'owner'`, [buildId], transaction)
  switch (what.kind) {
    case 'comment-added':
      add('mention', what.mentions)
      add('reply', what.repliesTo)
      add('comment', await owners())
      break
    case 'round-asked':
      add('review-asked', what.asked)
      break
    case 'verdict-given':
      add('verdict', await askers(database, buildId, what.roundId, transaction))
      add('verdict', await owners())
      break
    case 'approval-lapsed':
      add('approval-lapsed', await judges(database, buildId, what.roundId, transaction))
      add('approval-lapsed', await owners())
      break
    case 'round-closed':
      add('round-closed', await asked(database, buildId, what.roundId, transaction))
      add('round-closed', await judges(database, buildId, what.roundId, transaction))
      break
    case 'role-changed':
    case 'ownership-transferred':
      add('people', [what.userId])
      break
    case 'member-joined':
    case 'member-left':
    case 'guest-joined':
      add('people', await owners())
      break
    default:
  }
  return told
}

async function ids(
  database: Sequelize,
  sql: string,
  bind: readonly string[],
  transaction: Transaction,
): Promise<string[]> {
  const rows = await database.query<{ user_id: string }>(sql, {
    bind: [...bind],
    type: QueryTypes.SELECT,
    transaction,
  })
  return rows.map((row) => row.user_id)
}

const ofRound = `FROM activity WHERE build_id = $1 AND details ->> 'roundId' = $2`

const askers = (database: Sequelize, buildId: string, roundId: string, transaction: Transaction) =>
  ids(
    database,
    `SELECT user_id ${ofRound} AND kind = 'round-asked' AND user_id IS NOT NULL`,
    [buildId, roundId],
    transaction,
  )

const asked = (database: Sequelize, buildId: string, roundId: string, transaction: Transaction) =>
  ids(
    database,
    `SELECT jsonb_array_elements_text(details -> 'asked') AS user_id ${ofRound} AND kind = 'round-asked'`,
    [buildId, roundId],
    transaction,
  )

const judges = (database: Sequelize, buildId: string, roundId: string, transaction: Transaction) =>
  ids(
    database,
    `SELECT DISTINCT user_id ${ofRound} AND kind = 'verdict-given' AND user_id IS NOT NULL`,
    [buildId, roundId],
    transaction,
  )
