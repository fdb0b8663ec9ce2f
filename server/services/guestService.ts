import { QueryTypes } from 'sequelize'
import type { GuestRight } from '../policies/policy.ts'
import type { Context } from './context.ts'
import { hashToken } from './tokens.ts'

/** A guest whose link still holds. */
export interface KnownGuest {
  id: string
  linkId: string
  buildId: string
  name: string
  right: GuestRight
}

/** The guest that a cookie's token stands for; null once the link is revoked or over, or the guest was closed out. */
export async function findGuest(context: Pick<Context, 'database'>, token: string): Promise<KnownGuest | null> {
  const rows = await context.database.query<KnownGuest>(
    `SELECT g.id, g.link_id AS "linkId", g.build_id AS "buildId", g.name, l.kind AS "right"
     FROM guests g JOIN build_links l ON l.id = g.link_id
     WHERE g.token_hash = $1 AND g.closed_at IS NULL AND l.revoked_at IS NULL AND l.expires_at > now()`,
    { bind: [hashToken(token)], type: QueryTypes.SELECT },
  )
  return rows[0] ?? null
}
