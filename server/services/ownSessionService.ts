import { QueryTypes } from 'sequelize'
import type { OwnSession } from '#shared/contract/account.ts'
import { Session } from '../models/index.ts'
import type { Context } from './context.ts'
import { Refusal } from './refusal.ts'
import { endSessionsOf, type SignedIn } from './sessionService.ts'

type Row = { id: string; browser: string | null; created_at: Date; last_seen_at: Date; expires_at: Date }

/** One's own sessions that are still good, the latest used first. */
export async function listOwnSessions(context: Context, { user, sessionId }: SignedIn): Promise<OwnSession[]> {
  const rows = await context.database.query<Row>(
    `SELECT id, browser, created_at, last_seen_at, expires_at FROM sessions
     WHERE user_id = $1 AND revoked_at IS NULL AND expires_at > now() ORDER BY last_seen_at DESC LIMIT 200`,
    { bind: [user.id], type: QueryTypes.SELECT },
  )
  return rows.map((row) => ({
    id: row.id,
    current: row.id === sessionId,
    browser: row.browser,
    startedAt: row.created_at.toISOString(),
    lastSeenAt: row.last_seen_at.toISOString(),
    endsAt: row.expires_at.toISOString(),
  }))
}

/** Ends one session of one's own, wherever it is open. */
export async function endOwnSession(userId: string, sessionId: string): Promise<void> {
  const [ended] = await Session.update(
    { revokedAt: new Date(), revokedBecause: 'ended by its owner' },
    { where: { id: sessionId, userId, revokedAt: null } },
  )
  if (ended === 0) throw new Refusal('not-found')
}

/** Ends every session of one's own but the one that asks. */
export async function endOtherSessions(context: Context, { user, sessionId }: SignedIn): Promise<void> {
  await context.database.transaction((transaction) =>
    endSessionsOf(user.id, 'ended by its owner', transaction, sessionId),
  )
}

/** Notes in which browser a session was opened. */
export async function noteBrowser(sessionId: string, userAgent: string | undefined): Promise<void> {
  await Session.update({ browser: browserWords(userAgent) }, { where: { id: sessionId } })
}

const browsers: readonly [RegExp, string][] = [
  [/\bEdg(e|A|iOS)?\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\bFirefox\/|\bFxiOS\//, 'Firefox'],
  [/Chrome\/|\bCriOS\/|\bChromium\//, 'Chrome or Chromium'],
  [/\bSafari\//, 'Safari'],
]
const systems: readonly [RegExp, string][] = [
  [/\bAndroid\b/, 'Android'],
  [/\biPhone\b|\biPad\b/, 'iPhone or iPad'],
  [/\bWindows\b/, 'Windows'],
  [/\bMac OS X\b/, 'a Mac'],
  [/\bCrOS\b/, 'ChromeOS'],
  [/\bLinux\b/, 'Linux'],
]

/** A browser by the name that it gives itself, which anybody may make up: for recognising, never for trusting. */
export function browserWords(userAgent: string | undefined): string | null {
  if (!userAgent) return null
  const find = (names: readonly [RegExp, string][]) => names.find(([pattern]) => pattern.test(userAgent))?.[1]
  const [browser, system] = [find(browsers), find(systems)]
  if (!browser && !system) return 'Another program'
  return `${browser ?? 'A browser'}${system ? ` on ${system}` : ''}`
}
