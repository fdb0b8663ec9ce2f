import { randomUUID } from 'node:crypto'
import { QueryTypes, type Transaction } from 'sequelize'
import type { BuildRole } from '#shared/contract/build.ts'
import type { GiveVerdictRequest, Round } from '#shared/contract/rounds.ts'
import { publish, type Cause } from '../events/publish.ts'
import { Build } from '../models/index.ts'
import { lapseApprovals } from './approvalService.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'
import { readRevision } from './revisionList.ts'
import { findRound, type Reviewer } from './roundList.ts'

const causeOf = (reviewer: Reviewer): Cause =>
  'guest' in reviewer ? { guestId: reviewer.guest.id } : { userId: reviewer.userId }

/** Gives a verdict, or changes one's own, while the round is open. */
export async function giveVerdict(
  context: Context,
  reviewer: Reviewer,
  buildId: string,
  roundId: string,
  request: GiveVerdictRequest,
): Promise<Round> {
  return context.database.transaction(async (transaction) => {
    const build = await holdBuild(buildId, transaction)
    const round = await holdOpenRound(context, buildId, roundId, reviewer, transaction)
    if (!round.mayJudge) throw new Refusal('forbidden', { detail: whyNot(reviewer) })
    await writeVerdict(context, roundId, reviewer, request, transaction)
    const judged = await settleApproval(context, round, reviewer, transaction)
    const { number, revision } = round
    await publish(
      context,
      buildId,
      causeOf(reviewer),
      { kind: 'verdict-given', roundId, round: number, revision, verdict: request.verdict, summary: request.summary },
      transaction,
    )
    if (judged.standing !== 'approved' || build.revision === revision) return judged
    await lapseWhatMovedOn(context, build, causeOf(reviewer), transaction)
    return reread(context, buildId, roundId, reviewer, transaction)
  })
}

/** Ends a round: closed, it keeps its outcome; withdrawn, it counts for nothing. */
export async function endRound(
  context: Context,
  member: { userId: string; role: BuildRole },
  buildId: string,
  roundId: string,
  as: 'closed' | 'withdrawn',
): Promise<Round> {
  return context.database.transaction(async (transaction) => {
    await holdBuild(buildId, transaction)
    const { number } = await holdOpenRound(context, buildId, roundId, member, transaction)
    await context.database.query('UPDATE rounds SET state = $2, ended_at = now() WHERE id = $1', {
      bind: [roundId, as],
      transaction,
    })
    const ended = { kind: 'round-closed', roundId, round: number } as const
    await publish(context, buildId, { userId: member.userId }, ended, transaction)
    return reread(context, buildId, roundId, member, transaction)
  })
}

/** Verdicts and saves of one build take turns, so that no approval slips past a save of the same moment. */
async function holdBuild(buildId: string, transaction: Transaction): Promise<Build> {
  const build = await Build.findByPk(buildId, { transaction, lock: transaction.LOCK.UPDATE })
  if (!build) throw new Refusal('not-found')
  return build
}

async function holdOpenRound(
  context: Context,
  buildId: string,
  roundId: string,
  reader: Reviewer,
  transaction: Transaction,
): Promise<Round> {
  const round = await reread(context, buildId, roundId, reader, transaction)
  if (round.state !== 'open')
    throw new Refusal('conflict', { detail: `Round ${round.number} is over. Reload the page to see how it ended.` })
  return round
}

async function reread(
  context: Context,
  buildId: string,
  roundId: string,
  reader: Reviewer,
  transaction: Transaction,
): Promise<Round> {
  const round = await findRound(context, buildId, roundId, reader, transaction)
  if (!round) throw new Refusal('not-found')
  return round
}

const whyNot = (reviewer: Reviewer): string =>
  'guest' in reviewer || reviewer.role === 'reader'
    ? 'You may look at this build, but not judge it.'
    : 'Nobody judges what they asked about themselves.'

async function writeVerdict(
  context: Context,
  roundId: string,
  reviewer: Reviewer,
  { verdict, summary }: GiveVerdictRequest,
  transaction: Transaction,
): Promise<void> {
  const [column, id] = 'guest' in reviewer ? ['guest_id', reviewer.guest.id] : ['user_id', reviewer.userId]
  await context.database.query(
    `INSERT INTO verdicts (id, round_id, ${column}, verdict, summary) VALUES ($1, $2, $3, $4, $5)
     ON CONFLICT (round_id, ${column}) DO UPDATE SET verdict = $4, summary = $5, given_at = now()`,
    { bind: [randomUUID(), roundId, id, verdict, summary], transaction },
  )
}

/** Writes down whether the verdicts now come to an approval. */
async function settleApproval(
  context: Context,
  { id }: Round,
  reader: Reviewer,
  transaction: Transaction,
): Promise<Round> {
  const rows = await context.database.query<{ build_id: string }>(
    'UPDATE rounds SET lapsed_revision = NULL, approved_at = NULL WHERE id = $1 RETURNING build_id',
    { bind: [id], type: QueryTypes.SELECT, transaction },
  )
  const round = await reread(context, rows[0]?.build_id ?? '', id, reader, transaction)
  if (round.standing === 'approved')
    await context.database.query('UPDATE rounds SET approved_at = now() WHERE id = $1', { bind: [id], transaction })
  return round
}

/** An approval may come when the diagram has moved on already: it has then lapsed as it is given. */
async function lapseWhatMovedOn(context: Context, build: Build, cause: Cause, transaction: Transaction): Promise<void> {
  const { revision, changedBy } = build
  const { document } = await readRevision(context, build.id, revision)
  const mover = changedBy === null ? cause : { userId: changedBy }
  await lapseApprovals(context, { buildId: build.id, revision, document, cause: mover }, transaction)
}
