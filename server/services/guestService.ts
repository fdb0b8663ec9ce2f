import { randomUUID } from 'node:crypto'
import { QueryTypes } from 'sequelize'
import type { JoinRequest, LinkView } from '#shared/contract/buildLinks.ts'
import type { GuestSession } from '#shared/contract/guest.ts'
import { publish } from '../events/publish.ts'
import { Build, BuildLink, Guest, User } from '../models/index.ts'
import type { Actor, GuestRight } from '../policies/policy.ts'
import { findRole } from './buildService.ts'
import type { Context } from './context.ts'
import { verifyPassword } from './passwordService.ts'
import { Refusal } from './refusal.ts'
import { hashToken, makeToken } from './tokens.ts'

/** A guest whose link still holds. */
export interface KnownGuest {
  id: string
  linkId: string
  buildId: string
  buildName: string
  name: string
  right: GuestRight
}

/** The guest that a cookie's token stands for; null once the link is revoked or over, or the guest was closed out. */
export async function findGuest(context: Pick<Context, 'database'>, token: string): Promise<KnownGuest | null> {
  const rows = await context.database.query<KnownGuest>(
    `SELECT g.id, g.link_id AS "linkId", g.build_id AS "buildId", b.name AS "buildName", g.name, l.kind AS "right"
     FROM guests g JOIN build_links l ON l.id = g.link_id JOIN builds b ON b.id = g.build_id
     WHERE g.token_hash = $1 AND g.closed_at IS NULL AND l.revoked_at IS NULL AND l.expires_at > now()`,
    { bind: [hashToken(token)], type: QueryTypes.SELECT },
  )
  return rows[0] ?? null
}

/** A guest as their own browser is told. */
export const toGuestSession = ({ id, name, right, buildId, buildName }: KnownGuest): GuestSession => ({
  id,
  name,
  right,
  buildId,
  buildName,
})

/** What the arrival page says. Behind a pass phrase a stranger learns no more than that there is one. */
export async function viewLink(
  context: Context,
  token: string,
  actor: Actor,
  guest: KnownGuest | null,
): Promise<LinkView> {
  const link = await findOpenLink(token)
  const inside = await findInside(context, link, actor, guest)
  const mayKnow = link.passPhraseHash === null || inside !== null
  const [build, maker] = mayKnow
    ? await Promise.all([Build.findByPk(link.buildId), link.madeBy === null ? null : User.findByPk(link.madeBy)])
    : [null, null]
  return {
    kind: link.kind,
    needsPassPhrase: link.passPhraseHash !== null,
    expiresAt: link.expiresAt.toISOString(),
    buildName: build?.name ?? null,
    madeBy: maker?.name ?? null,
    inside,
  }
}

async function findInside(
  context: Context,
  { id, buildId }: BuildLink,
  actor: Actor,
  guest: KnownGuest | null,
): Promise<LinkView['inside']> {
  if (actor && (await findRole(context, buildId, actor.id))) return { buildId, as: 'member', name: actor.name }
  return guest?.linkId === id ? { buildId, as: 'guest', name: guest.name } : null
}

/** Lets somebody in under the name that they give. The token is for their cookie. */
export async function join(
  context: Context,
  linkToken: string,
  request: JoinRequest,
): Promise<{ buildId: string; token: string; until: Date }> {
  const link = await findOpenLink(linkToken)
  if (link.passPhraseHash !== null && !(await verifyPassword(link.passPhraseHash, request.passPhrase ?? '')))
    throw new Refusal('wrong-credentials', {
      detail: 'The pass phrase does not match. Whoever sent you the link knows it.',
    })
  const token = makeToken()
  await context.database.transaction(async (transaction) => {
    const { id: linkId, buildId } = await link.reload({ transaction, lock: transaction.LOCK.SHARE })
    if (link.revokedAt !== null) throw new Refusal('link-expired')
    const id = randomUUID()
    await Guest.create({ id, linkId, buildId, name: request.name, tokenHash: hashToken(token) }, { transaction })
    await publish(context, buildId, { guestId: id }, { kind: 'guest-joined', name: request.name }, transaction)
  })
  return { buildId: link.buildId, token, until: link.expiresAt }
}

/** A guest goes: what they wrote stays, their cookie opens nothing any more. */
export async function leave(guest: KnownGuest): Promise<void> {
  await Guest.update({ closedAt: new Date(), closedBecause: 'left' }, { where: { id: guest.id, closedAt: null } })
}

async function findOpenLink(token: string): Promise<BuildLink> {
  const link = await BuildLink.findOne({ where: { tokenHash: hashToken(token) } })
  if (!link || link.revokedAt !== null || link.expiresAt.getTime() <= Date.now()) throw new Refusal('link-expired')
  return link
}
