import { QueryTypes, type Sequelize } from 'sequelize'
import type { LiveEvent } from '#shared/contract/live.ts'

/** Who listens to a stream, as far as their right to it goes. */
export type Reader = { kind: 'member'; userId: string; sessionId: string } | { kind: 'guest'; guestId: string }

type Reason = LiveEvent<'end'>['reason']

/** Why a reader may no longer listen; null while they may. Asked whenever something may have changed, and now and then. */
export async function whyEnd(database: Sequelize, reader: Reader, buildId: string | null): Promise<Reason | null> {
  if (reader.kind === 'guest') {
    const rows = await database.query(
      `SELECT 1 FROM guests g JOIN build_links l ON l.id = g.link_id
       WHERE g.id = $1 AND g.build_id = $2 AND g.closed_at IS NULL AND l.revoked_at IS NULL AND l.expires_at > now()`,
      { bind: [reader.guestId, buildId], type: QueryTypes.SELECT },
    )
    return rows.length > 0 ? null : 'access'
  }
  const rows = await database.query<{ member: boolean }>(
    `SELECT $3::uuid IS NULL OR EXISTS (
       SELECT 1 FROM build_members m WHERE m.build_id = $3::uuid AND m.user_id = u.id) AS member
     FROM sessions s JOIN users u ON u.id = s.user_id
     WHERE s.id = $1 AND u.id = $2 AND s.revoked_at IS NULL AND s.expires_at > now() AND u.disabled_at IS NULL`,
    { bind: [reader.sessionId, reader.userId, buildId], type: QueryTypes.SELECT },
  )
  if (!rows[0]) return 'session'
  return rows[0].member ? null : 'access'
}
