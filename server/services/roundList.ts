import { QueryTypes, type Transaction } from 'sequelize'
import type { Author } from '#shared/contract/activity.ts'
import type { BuildRole } from '#shared/contract/build.ts'
import type { Asked, ReviewRules, Round, VerdictKind } from '#shared/contract/rounds.ts'
import { standingOf } from '#shared/review/standing.ts'
import type { Context } from './context.ts'
import type { KnownGuest } from './guestService.ts'

/** Who looks at the rounds or gives a verdict. */
export type Reviewer = { userId: string; role: BuildRole } | { guest: KnownGuest }

/** Where the owners set nothing. */
export const standardRules: ReviewRules = { approvals: 1, heldBackBy: 'none', guestsCount: true }

/** Rounds that are shown; older ones of a build with more stay in its activity. */
const most = 100

interface RoundRow {
  id: string
  number: number
  revision: number
  previous_revision: number | null
  question: string
  state: Round['state']
  asked_by: string | null
  asked_name: string | null
  asked_at: Date
  ended_at: Date | null
  by_link: boolean
  approvals: number
  held_back_by: ReviewRules['heldBackBy']
  guests_count: boolean
  dangers: number | null
  faults: number | null
  lapsed_revision: number | null
  asked: Asked[]
  verdicts: VerdictRow[]
}

interface VerdictRow {
  userId: string | null
  guestId: string | null
  name: string | null
  verdict: VerdictKind
  summary: string
  givenAt: string
}

/** An address is shown with its account's name only once that account belongs to the build. */
const selectRounds = `
  SELECT r.*, u.name AS asked_name,
    (SELECT p.revision FROM rounds p WHERE p.build_id = r.build_id AND p.number < r.number AND p.state <> 'withdrawn'
     ORDER BY p.number DESC LIMIT 1) AS previous_revision,
    (SELECT coalesce(json_agg(json_build_object('userId', w.id, 'name', w.name, 'email', a.email)
                              ORDER BY w.name, a.email), '[]')
     FROM round_asked a LEFT JOIN users w ON w.id = a.user_id OR (w.email = a.email AND EXISTS (
       SELECT FROM build_members m WHERE m.build_id = r.build_id AND m.user_id = w.id))
     WHERE a.round_id = r.id) AS asked,
    (SELECT coalesce(json_agg(json_build_object(
       'userId', v.user_id, 'guestId', v.guest_id, 'name', coalesce(vu.name, vg.name), 'verdict', v.verdict,
       'summary', v.summary, 'givenAt', to_json(v.given_at)) ORDER BY v.given_at), '[]')
     FROM verdicts v LEFT JOIN users vu ON vu.id = v.user_id LEFT JOIN guests vg ON vg.id = v.guest_id
     WHERE v.round_id = r.id) AS verdicts
  FROM rounds r LEFT JOIN users u ON u.id = r.asked_by`

/** The rounds of a build, newest first, as this reader sees them. */
export async function listRounds(context: Context, buildId: string, reader: Reviewer): Promise<Round[]> {
  const rows = await context.database.query<RoundRow>(
    `${selectRounds} WHERE r.build_id = $1 ORDER BY r.number DESC LIMIT ${most}`,
    { bind: [buildId], type: QueryTypes.SELECT },
  )
  return rows.map((row) => toView(row, reader))
}

/** One round of a build; null where it has none of that id. */
export async function findRound(
  context: Context,
  buildId: string,
  roundId: string,
  reader: Reviewer,
  transaction?: Transaction,
): Promise<Round | null> {
  const rows = await context.database.query<RoundRow>(`${selectRounds} WHERE r.build_id = $1 AND r.id = $2`, {
    bind: [buildId, roundId],
    type: QueryTypes.SELECT,
    ...(transaction ? { transaction } : {}),
  })
  return rows[0] ? toView(rows[0], reader) : null
}

function toView(row: RoundRow, reader: Reviewer): Round {
  const verdicts = row.verdicts.map(({ userId, guestId, name, verdict, summary, givenAt }) => ({
    by: toAuthor(userId, guestId, name),
    verdict,
    summary,
    givenAt: new Date(givenAt).toISOString(),
    mine: 'guest' in reader ? guestId === reader.guest.id : userId === reader.userId,
  }))
  const rules = { approvals: row.approvals, heldBackBy: row.held_back_by, guestsCount: row.guests_count }
  const stops = row.dangers === null || row.faults === null ? null : { danger: row.dangers, fault: row.faults }
  const { state, lapsed_revision: lapsedRevision } = row
  return {
    id: row.id,
    number: row.number,
    revision: row.revision,
    previousRevision: row.previous_revision,
    question: row.question,
    state,
    standing: standingOf({
      state,
      rules,
      stops,
      lapsedRevision,
      verdicts: row.verdicts.map(({ verdict, guestId }) => ({ verdict, guest: guestId !== null })),
    }),
    askedBy: toAuthor(row.asked_by, null, row.asked_name),
    askedAt: row.asked_at.toISOString(),
    endedAt: row.ended_at?.toISOString() ?? null,
    asked: 'guest' in reader ? row.asked.map(withoutAddress) : row.asked,
    byLink: row.by_link,
    rules,
    stops,
    verdicts,
    lapsedRevision,
    mayJudge: state === 'open' && mayJudge(row, reader),
  }
}

/** Who has no name yet is known by an address alone, and that is not for guests. */
const withoutAddress = ({ userId, name }: Asked): Asked => ({ userId, name, email: null })

const toAuthor = (userId: string | null, guestId: string | null, name: string | null): Author => {
  if (userId !== null && name !== null) return { kind: 'member', userId, name }
  return guestId !== null && name !== null ? { kind: 'guest', guestId, name } : { kind: 'former' }
}

/** Reviewers and up, and guests of review links; never the person who asked. */
function mayJudge({ asked_by }: Pick<RoundRow, 'asked_by'>, reader: Reviewer): boolean {
  if ('guest' in reader) return reader.guest.right === 'review'
  return reader.role !== 'reader' && reader.userId !== asked_by
}

/** What an approval of this build needs. */
export async function readRules(context: Context, buildId: string, transaction?: Transaction): Promise<ReviewRules> {
  const rows = await context.database.query<ReviewRules>(
    `SELECT approvals, held_back_by AS "heldBackBy", guests_count AS "guestsCount" FROM review_rules WHERE build_id = $1`,
    { bind: [buildId], type: QueryTypes.SELECT, ...(transaction ? { transaction } : {}) },
  )
  return rows[0] ?? standardRules
}

/** Sets what an approval needs, from the next round on. */
export async function setRules(context: Context, buildId: string, rules: ReviewRules): Promise<ReviewRules> {
  await context.database.query(
    `INSERT INTO review_rules (build_id, approvals, held_back_by, guests_count) VALUES ($1, $2, $3, $4)
     ON CONFLICT (build_id) DO UPDATE SET approvals = $2, held_back_by = $3, guests_count = $4`,
    { bind: [buildId, rules.approvals, rules.heldBackBy, rules.guestsCount] },
  )
  return rules
}
