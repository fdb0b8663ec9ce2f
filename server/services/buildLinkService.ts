import { randomUUID } from 'node:crypto'
import { QueryTypes, type Transaction } from 'sequelize'
import type { BuildLink as BuildLinkView, LinkGuest, MadeLink, MakeLinkRequest } from '#shared/contract/buildLinks.ts'
import type { LinkKind } from '#shared/contract/guest.ts'
import { publish } from '../events/publish.ts'
import { BuildLink, Guest } from '../models/index.ts'
import type { Context } from './context.ts'
import { hashPassword } from './passwordService.ts'
import { Refusal } from './refusal.ts'
import { hashToken, makeToken } from './tokens.ts'

const day_ms = 24 * 3_600_000
/** Links that are shown; a build with more has its oldest left out. */
const most = 200

/** A link about to be written: the pass phrase is hashed before the transaction, for hashing takes its time. */
export interface LinkDraft {
  id: string
  token: string
  passPhraseHash: string | null
}

export const draftLink = async (passPhrase: string | undefined): Promise<LinkDraft> => ({
  id: randomUUID(),
  token: makeToken(),
  passPhraseHash: passPhrase === undefined ? null : await hashPassword(passPhrase),
})

/** Writes a link, and says so in the build's activity. */
export async function writeLink(
  context: Context,
  draft: LinkDraft,
  made: { buildId: string; userId: string; kind: LinkKind; label: string; days: number },
  transaction: Transaction,
): Promise<void> {
  const { buildId, userId, kind, label, days } = made
  await BuildLink.create(
    {
      id: draft.id,
      buildId,
      kind,
      label,
      tokenHash: hashToken(draft.token),
      passPhraseHash: draft.passPhraseHash,
      madeBy: userId,
      expiresAt: new Date(Date.now() + days * day_ms),
    },
    { transaction },
  )
  await publish(context, buildId, { userId }, { kind: 'link-made', linkId: draft.id, label }, transaction)
}

/** Makes a link. Its token is told this once; the database keeps a hash. */
export async function makeLink(
  context: Context,
  userId: string,
  buildId: string,
  request: MakeLinkRequest,
): Promise<MadeLink> {
  const { passPhrase, ...wanted } = request
  const draft = await draftLink(passPhrase)
  await context.database.transaction((transaction) =>
    writeLink(context, draft, { buildId, userId, ...wanted }, transaction),
  )
  const link = (await listLinks(context, buildId)).find((one) => one.id === draft.id)
  if (!link) throw new Refusal('not-found')
  return { link, token: draft.token }
}

type LinkRow = {
  id: string
  kind: LinkKind
  label: string
  has_pass_phrase: boolean
  made_by: string | null
  made_at: Date
  expires_at: Date
  revoked_at: Date | null
  guests: (Omit<LinkGuest, 'state'> & { closedBecause: 'left' | 'closed out' | null })[]
}

/** The links of a build, newest first, each with who came by it. */
export async function listLinks(context: Context, buildId: string): Promise<BuildLinkView[]> {
  const rows = await context.database.query<LinkRow>(
    `SELECT l.id, l.kind, l.label, l.pass_phrase_hash IS NOT NULL AS has_pass_phrase, u.name AS made_by, l.made_at,
       l.expires_at, l.revoked_at,
       (SELECT coalesce(json_agg(json_build_object(
          'id', g.id, 'name', g.name, 'joinedAt', to_json(g.joined_at), 'lastSeenAt', to_json(g.last_seen_at),
          'closedBecause', CASE WHEN g.closed_at IS NOT NULL THEN coalesce(g.closed_because, 'closed out') END)
          ORDER BY g.joined_at DESC), '[]')
        FROM (SELECT * FROM guests WHERE link_id = l.id ORDER BY joined_at DESC LIMIT 100) g) AS guests
     FROM build_links l LEFT JOIN users u ON u.id = l.made_by
     WHERE l.build_id = $1 ORDER BY l.made_at DESC LIMIT ${most}`,
    { bind: [buildId], type: QueryTypes.SELECT },
  )
  return rows.map(toView)
}

/** The link opens nothing any more, and the guests who came by it are out at once. */
export async function revokeLink(context: Context, userId: string, buildId: string, linkId: string): Promise<void> {
  await context.database.transaction(async (transaction) => {
    const link = await BuildLink.findOne({ where: { id: linkId, buildId }, transaction, lock: transaction.LOCK.UPDATE })
    if (!link) throw new Refusal('not-found')
    if (link.revokedAt !== null) return
    await link.update({ revokedAt: new Date() }, { transaction })
    const { label } = link
    await publish(context, buildId, { userId }, { kind: 'link-revoked', linkId, label }, transaction)
  })
}

/** Shuts the door on one guest. What they wrote stays. */
export async function closeOutGuest(buildId: string, guestId: string): Promise<void> {
  const guest = await Guest.findOne({ where: { id: guestId, buildId } })
  if (!guest) throw new Refusal('not-found')
  if (guest.closedAt === null) await guest.update({ closedAt: new Date(), closedBecause: 'closed out' })
}

const iso = (at: Date | string): string => new Date(at).toISOString()

const toView = (row: LinkRow): BuildLinkView => ({
  id: row.id,
  kind: row.kind,
  label: row.label,
  hasPassPhrase: row.has_pass_phrase,
  madeBy: row.made_by,
  madeAt: iso(row.made_at),
  expiresAt: iso(row.expires_at),
  revokedAt: row.revoked_at && iso(row.revoked_at),
  state: row.revoked_at ? 'revoked' : row.expires_at.getTime() <= Date.now() ? 'expired' : 'open',
  guests: row.guests.map(({ closedBecause, ...guest }) => ({
    ...guest,
    joinedAt: iso(guest.joinedAt),
    lastSeenAt: iso(guest.lastSeenAt),
    state: closedBecause ?? 'here',
  })),
})
