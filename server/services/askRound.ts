import { randomUUID } from 'node:crypto'
import { QueryTypes, type Transaction } from 'sequelize'
import type { BuildRole } from '#shared/contract/build.ts'
import type { AskRoundRequest, Round } from '#shared/contract/rounds.ts'
import type { User } from '#shared/contract/session.ts'
import { publish } from '../events/publish.ts'
import { Build } from '../models/index.ts'
import { approvedHash } from './approvalService.ts'
import { draftLink, writeLink, type LinkDraft } from './buildLinkService.ts'
import type { Context } from './context.ts'
import { inviteWithin } from './invitationService.ts'
import { Refusal } from './refusal.ts'
import { readRevision } from './revisionList.ts'
import { findRound, readRules } from './roundList.ts'

/** The revision that the reviewers will look at, read and checked before anything is written. */
interface Frozen {
  revision: number
  hash: string
  stops: Round['stops']
}

/**
 * Asks for review of one revision: of members, of people invited in the same step, of anybody with a link. The round before, if
 * one is still open, ends with it.
 */
export async function askRound(
  context: Context,
  asker: { user: User; role: BuildRole },
  buildId: string,
  request: AskRoundRequest,
): Promise<{ round: Round; token: string | null }> {
  refuseBeyondRole(asker.role, request)
  const frozen = await freeze(context, buildId, request.revision)
  const draft = request.link ? await draftLink(request.link.passPhrase) : null
  const id = randomUUID()
  await context.database.transaction(async (transaction) => {
    const build = await Build.findByPk(buildId, { transaction, lock: transaction.LOCK.UPDATE })
    if (!build) throw new Refusal('not-found')
    const asked = await findAsked(context, buildId, asker.user, request, transaction)
    for (const email of asked.emails)
      await inviteWithin(context, asker.user, build, { email, role: 'reviewer' }, transaction)
    const number = await nextNumber(context, buildId, transaction)
    await endOpenRound(context, buildId, asker.user.id, transaction)
    if (draft) await addLink(context, draft, number, asker.user.id, buildId, request, transaction)
    await writeRound(context, { id, buildId, number, frozen, asker: asker.user.id, request, draft }, transaction)
    await writeAsked(context, id, asked, transaction)
    await publish(
      context,
      buildId,
      { userId: asker.user.id },
      {
        kind: 'round-asked',
        roundId: id,
        round: number,
        revision: frozen.revision,
        asked: asked.userIds,
        question: request.question,
      },
      transaction,
    )
  })
  context.jobs.wake()
  const round = await findRound(context, buildId, id, { userId: asker.user.id, role: asker.role })
  if (!round) throw new Refusal('not-found')
  return { round, token: draft?.token ?? null }
}

/** Inviting people and making links is the owners' alone; editors ask who is in the build already. */
function refuseBeyondRole(role: BuildRole, { invite, link }: AskRoundRequest): void {
  if (role !== 'owner' && (invite.length > 0 || link))
    throw new Refusal('forbidden', { detail: 'Only owners invite people and make links. Ask members of the build.' })
}

async function freeze(context: Context, buildId: string, wanted: number | undefined): Promise<Frozen> {
  const build = await Build.findByPk(buildId, { attributes: ['revision'] })
  if (!build) throw new Refusal('not-found')
  const revision = wanted ?? build.revision
  if (revision > build.revision)
    throw new Refusal('bad-input', {
      errors: [{ path: 'revision', message: `the newest revision is ${build.revision}` }],
    })
  const { document } = await readRevision(context, buildId, revision)
  return { revision, hash: approvedHash(document), stops: await stopsOf(context, document) }
}

async function stopsOf(context: Context, document: Parameters<Context['checks']['check']>[0]): Promise<Round['stops']> {
  try {
    const { counts } = await context.checks.check(document, await context.catalog.current())
    return { danger: counts.danger, fault: counts.fault }
  } catch (error) {
    context.log.error({ err: error }, 'check broke off')
    return null
  }
}

/** Who is asked by account, and whom to invite; an address that is in the build already counts as its account. */
async function findAsked(
  context: Context,
  buildId: string,
  asker: User,
  { reviewers, invite }: AskRoundRequest,
  transaction: Transaction,
): Promise<{ userIds: string[]; emails: string[] }> {
  const members = await context.database.query<{ id: string; email: string; name: string; role: BuildRole }>(
    `SELECT u.id, u.email, u.name, m.role FROM build_members m JOIN users u ON u.id = m.user_id
     WHERE m.build_id = $1 AND (u.id = ANY($2) OR u.email = ANY($3))`,
    { bind: [buildId, reviewers, invite], type: QueryTypes.SELECT, transaction },
  )
  const readAs = (path: string, find: (member: { id: string; email: string }) => boolean): string => {
    const member = members.find(find)
    if (!member) throw refusedAt(path, 'this person is not in the build')
    if (member.id === asker.id) throw refusedAt(path, 'nobody reviews what they ask for themselves')
    if (member.role === 'reader')
      throw refusedAt(path, `${member.name} may only read: an owner has to make them reviewer first`)
    return member.id
  }
  const named = reviewers.map((id, i) => readAs(`reviewers[${i}]`, (member) => member.id === id))
  const known = new Set(members.map(({ email }) => email))
  const byMail = invite.flatMap((email, i) =>
    known.has(email) ? [readAs(`invite[${i}]`, (member) => member.email === email)] : [],
  )
  return {
    userIds: [...new Set([...named, ...byMail])],
    emails: [...new Set(invite.filter((email) => !known.has(email)))],
  }
}

const refusedAt = (path: string, message: string): Refusal => new Refusal('bad-input', { errors: [{ path, message }] })

async function nextNumber(context: Context, buildId: string, transaction: Transaction): Promise<number> {
  const rows = await context.database.query<{ last: number | null }>(
    'SELECT max(number) AS last FROM rounds WHERE build_id = $1',
    { bind: [buildId], type: QueryTypes.SELECT, transaction },
  )
  return (rows[0]?.last ?? 0) + 1
}

async function endOpenRound(
  context: Context,
  buildId: string,
  userId: string,
  transaction: Transaction,
): Promise<void> {
  const ended = await context.database.query<{ id: string; number: number }>(
    `UPDATE rounds SET state = 'closed', ended_at = now() WHERE build_id = $1 AND state = 'open' RETURNING id, number`,
    { bind: [buildId], type: QueryTypes.SELECT, transaction },
  )
  for (const { id, number } of ended)
    await publish(context, buildId, { userId }, { kind: 'round-closed', roundId: id, round: number }, transaction)
}

async function addLink(
  context: Context,
  draft: LinkDraft,
  number: number,
  userId: string,
  buildId: string,
  { link }: AskRoundRequest,
  transaction: Transaction,
): Promise<void> {
  const made = { buildId, userId, kind: 'review' as const, label: `Review, round ${number}`, days: link?.days ?? 1 }
  await writeLink(context, draft, made, transaction)
}

async function writeRound(
  context: Context,
  made: {
    id: string
    buildId: string
    number: number
    frozen: Frozen
    asker: string
    request: AskRoundRequest
    draft: LinkDraft | null
  },
  transaction: Transaction,
): Promise<void> {
  const { frozen } = made
  const rules = await readRules(context, made.buildId, transaction)
  await context.database.query(
    `INSERT INTO rounds (id, build_id, number, revision, content_hash, question, asked_by, link_id, by_link,
       approvals, held_back_by, guests_count, dangers, faults)
     VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10, $11, $12, $13, $14)`,
    {
      bind: [
        made.id,
        made.buildId,
        made.number,
        frozen.revision,
        frozen.hash,
        made.request.question,
        made.asker,
        made.draft?.id ?? null,
        made.draft !== null,
        rules.approvals,
        rules.heldBackBy,
        rules.guestsCount,
        frozen.stops?.danger ?? null,
        frozen.stops?.fault ?? null,
      ],
      transaction,
    },
  )
}

async function writeAsked(
  context: Context,
  roundId: string,
  { userIds, emails }: { userIds: readonly string[]; emails: readonly string[] },
  transaction: Transaction,
): Promise<void> {
  await context.database.query(
    `INSERT INTO round_asked (round_id, user_id, email)
     SELECT $1::uuid, id, NULL FROM unnest($2::uuid[]) AS id UNION ALL SELECT $1::uuid, NULL, email FROM unnest($3::text[]) AS email`,
    { bind: [roundId, userIds, emails], transaction },
  )
}
