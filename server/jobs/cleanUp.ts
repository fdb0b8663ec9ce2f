import type { Sequelize } from 'sequelize'
import type { Job } from './jobLoop.ts'

const hour_ms = 3_600_000

const sweeps = [
  "DELETE FROM sessions WHERE expires_at < now() - interval '1 day'",
  "DELETE FROM refresh_tokens WHERE expires_at < now() - interval '1 day'",
  "DELETE FROM password_resets WHERE expires_at < now() - interval '1 day'",
  "DELETE FROM messages WHERE state <> 'queued' AND queued_at < now() - interval '30 days'",
  "DELETE FROM invitations WHERE accepted_at IS NULL AND expires_at < now() - interval '30 days'",
]

/** Once an hour, takes away sessions and links that nobody can use any more, and letters of a month ago. */
export function cleanUp(database: Sequelize): Job {
  let last = 0
  return async () => {
    if (Date.now() - last < hour_ms) return false
    last = Date.now()
    for (const sweep of sweeps) await database.query(sweep)
    return false
  }
}
